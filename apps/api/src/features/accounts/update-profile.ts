import type { endpoints } from '@nightcone/contracts';
import { saveProfile } from '@nightcone/db';
import type { Handler } from '../../context.ts';
import { notFound, Refusal } from '../../refusal.ts';
import { accountView } from './account-view.ts';

export const updateProfile: Handler<typeof endpoints.updateProfile> = async ({ ctx, input }) => {
  const { timeZone } = input.body;
  if (timeZone !== undefined && !isTimeZone(timeZone)) {
    const message = 'This time zone is not known; names look like Europe/Berlin.';
    throw new Refusal('invalid-input', message, { errors: [{ field: '/timeZone', message, value: timeZone }] });
  }
  const row = await saveProfile(ctx.services.db, ctx.caller.account.id, input.body);
  if (!row) throw notFound('account');
  return accountView(row);
};

function isTimeZone(name: string): boolean {
  try {
    new Intl.DateTimeFormat('en', { timeZone: name });
    return true;
  } catch {
    return false;
  }
}
