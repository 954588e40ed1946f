import type { endpoints } from '@nightcone/contracts';
import { deleteSessionsOfAccount } from '@nightcone/db';
import type { Handler } from '../../context.ts';

/** Every browser of this account, this one too. Tokens stay: they are revoked one by one. */
export const endAllSessions: Handler<typeof endpoints.endAllSessions> = async ({ ctx }) => {
  await deleteSessionsOfAccount(ctx.services.db, ctx.caller.account.id);
};
