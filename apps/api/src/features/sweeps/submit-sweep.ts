import type { endpoints } from '@nightcone/contracts';
import { submitSweep as submit } from '@nightcone/db';
import type { Handler } from '../../context.ts';
import { planToSubmit } from '../../planning/plan-to-submit.ts';
import { idempotency, refusingQuota } from '../../planning/submitting.ts';

export const submitSweep: Handler<typeof endpoints.submitSweep> = async ({ ctx, input }) => {
  const { db } = ctx.services;
  const { title, specification, axes, when } = input.body;
  const { jobs, points, summary } = await planToSubmit(ctx, { specification, axes });
  return refusingQuota(() =>
    submit(
      db,
      { accountId: ctx.caller.account.id, requestId: ctx.requestId },
      idempotency(input.idempotencyKey, 'submitSweep', input.body),
      {
        title,
        model: specification.model,
        tonight: when === 'tonight',
        definition: { specification: summary.base, axes: summary.axes },
        jobs,
        points,
      },
    ),
  );
};
