import type { endpoints } from '@nightcone/contracts';
import { findOptionalSweep, retryBrokenOff } from '@nightcone/db';
import type { Handler } from '../../context.ts';
import { refusingQuota } from '../../planning/submitting.ts';
import { notFound } from '../../refusal.ts';

/** Points that machinery broke off; what failed deterministically would fail again and stays as it is. */
export const retryFailed: Handler<typeof endpoints.retryFailed> = async ({ ctx, input }) => {
  const { db } = ctx.services;
  const { account } = ctx.caller;
  const sweep = await findOptionalSweep(db, input.params.id, account.id);
  if (!sweep) throw notFound('sweep');
  const actor = { accountId: account.id, requestId: ctx.requestId };
  return { points: await refusingQuota(() => retryBrokenOff(db, actor, sweep.submissionId)) };
};
