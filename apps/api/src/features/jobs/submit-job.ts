import type { endpoints } from '@nightcone/contracts';
import { submitJob as submit } from '@nightcone/db';
import type { Handler } from '../../context.ts';
import { jobTitle } from '../../job-title.ts';
import { planToSubmit } from '../../planning/plan-to-submit.ts';
import { idempotency, refusingQuota } from '../../planning/submitting.ts';

/** Submits one job; the identical question of somebody else is the same job, and its result is shared. */
export const submitJob: Handler<typeof endpoints.submitJob> = async ({ ctx, input }) => {
  const { db } = ctx.services;
  const { title, specification, when } = input.body;
  const { jobs, summary } = await planToSubmit(ctx, { specification, axes: [] });
  const [job] = jobs;
  if (!job) throw new Error('a plan without axes has one job');
  return refusingQuota(() =>
    submit(
      db,
      { accountId: ctx.caller.account.id, requestId: ctx.requestId },
      idempotency(input.idempotencyKey, 'submitJob', input.body),
      {
        title: title ?? jobTitle(summary.base),
        tonight: when === 'tonight',
        job,
      },
    ),
  );
};
