import type { endpoints } from '@nightcone/contracts';
import { countPointStates, findOptionalSubmission, findOptionalSweep } from '@nightcone/db';
import type { Handler } from '../../context.ts';
import { notFound } from '../../refusal.ts';
import { readLabels } from '../../scheduling/people.ts';
import { readSchedule } from '../../scheduling/read-schedule.ts';
import { sweepView } from './sweep-view.ts';

export const getSweep: Handler<typeof endpoints.getSweep> = async ({ ctx, input }) => {
  const { db } = ctx.services;
  const row = await findOptionalSweep(db, input.params.id, ctx.caller.account.id);
  const submission = row && (await findOptionalSubmission(db, row.submissionId));
  if (!submission) throw notFound('sweep');
  const [schedule, labels, counts] = await Promise.all([
    readSchedule(db),
    readLabels(db, ctx.caller),
    countPointStates(db, [row.submissionId]),
  ]);
  const states = counts.get(row.submissionId) ?? {};
  return {
    ...sweepView(row, submission, states, { schedule, labels, caller: ctx.caller }),
    axes: row.definition.axes as never[],
    specification: row.definition.specification as never,
  };
};
