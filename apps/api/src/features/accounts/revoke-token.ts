import type { endpoints } from '@nightcone/contracts';
import { revokeToken as revoke } from '@nightcone/db';
import type { Handler } from '../../context.ts';
import { notFound } from '../../refusal.ts';

export const revokeToken: Handler<typeof endpoints.revokeToken> = async ({ ctx, input }) => {
  const actor = { accountId: ctx.caller.account.id, requestId: ctx.requestId };
  if (!(await revoke(ctx.services.db, actor, ctx.caller.account.id, input.params.id))) throw notFound('token');
};
