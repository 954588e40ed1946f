import type { endpoints } from '@nightcone/contracts';
import { findOptionalSubmission } from '@nightcone/db';
import type { Handler } from '../../context.ts';
import { notFound } from '../../refusal.ts';
import { readLabels } from '../../scheduling/people.ts';
import { readSchedule } from '../../scheduling/read-schedule.ts';
import { submissionView } from '../../scheduling/submission-view.ts';

export const getSubmission: Handler<typeof endpoints.getSubmission> = async ({ ctx, input }) => {
  const { db } = ctx.services;
  const row = await findOptionalSubmission(db, input.params.id);
  // Open work shows to everybody; what has ended only to its owner and to admins.
  const { account } = ctx.caller;
  const ended = row?.state === 'done' || row?.state === 'cancelled';
  if (!row || (ended && row.accountId !== account.id && account.role !== 'admin')) throw notFound('submission');
  const [schedule, labels] = await Promise.all([readSchedule(db), readLabels(db, ctx.caller)]);
  return submissionView(row, schedule, labels, ctx.caller);
};
