import type { endpoints } from '@nightcone/contracts';
import { findOptionalJob, submitRerun } from '@nightcone/db';
import type { Handler } from '../../context.ts';
import { jobTitle } from '../../job-title.ts';
import { idempotency, refusingQuota } from '../../planning/submitting.ts';
import { notFound } from '../../refusal.ts';

/** Another execution of the same job; what it finds is compared with what is stored. Notes are not enforced here. */
export const rerunJob: Handler<typeof endpoints.rerunJob> = async ({ ctx, input }) => {
  const { db } = ctx.services;
  const { hash } = input.params;
  const { account } = ctx.caller;
  const job = await findOptionalJob(db, hash, account.id);
  if (!job) throw notFound('job');
  const submitted = await refusingQuota(() =>
    submitRerun(
      db,
      { accountId: account.id, requestId: ctx.requestId },
      idempotency(input.idempotencyKey, 'rerunJob', { hash }),
      { jobHash: hash, title: jobTitle(job.specification) },
    ),
  );
  if (!submitted) throw notFound('job');
  return submitted;
};
