import type { endpoints } from '@nightcone/contracts';
import { changeAccount as change } from '@nightcone/db';
import type { Handler } from '../../context.ts';
import { notFound, Refusal } from '../../refusal.ts';
import { accountView } from './account-view.ts';

export const changeAccount: Handler<typeof endpoints.changeAccount> = async ({ ctx, input }) => {
  const actor = { accountId: ctx.caller.account.id, requestId: ctx.requestId };
  const result = await change(ctx.services.db, actor, input.params.id, input.body);
  switch (result.outcome) {
    case 'changed':
      return accountView(result.account);
    case 'unknown':
      throw notFound('account');
    case 'last-admin':
      throw new Refusal('conflict', 'This is the only active admin; make somebody else one first.');
    case 'no-arrow':
      throw new Refusal('conflict', `An account that is ${result.state} cannot become ${input.body.state}.`);
  }
};
