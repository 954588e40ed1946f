import type { endpoints } from '@nightcone/contracts';
import { submitSweep as submit } from '@nightcone/db';
import type { Handler } from '../../context.ts';
import { plannedJob, planToSubmit } from '../../planning/plan-to-submit.ts';
import { idempotency, refusingQuota } from '../../planning/submitting.ts';

export const submitSweep: Handler<typeof endpoints.submitSweep> = async ({ ctx, input }) => {
  const { db } = ctx.services;
  const { title, specification, axes, when } = input.body;
  const { points, summary, kernel } = await planToSubmit(ctx, { specification, axes });
  const { model } = summary.base;
  // Two points of a sweep may be the same job, e.g. where an axis varies what a choice does not use.
  const distinct = [...new Map(points.map((point) => [point.hash, point])).values()];
  return refusingQuota(() =>
    submit(
      db,
      { accountId: ctx.caller.account.id, requestId: ctx.requestId },
      idempotency(input.idempotencyKey, 'submitSweep', input.body),
      {
        title,
        model,
        tonight: when === 'tonight',
        definition: { specification: summary.base, axes: summary.axes },
        jobs: distinct.map((point) => plannedJob(point, model, kernel.digest)),
        points: points.map(({ hash, index, values }) => ({ jobHash: hash, place: index, values })),
      },
    ),
  );
};
