import type { endpoints } from '@nightcone/contracts';
import { listEndedSubmissions } from '@nightcone/db';
import type { Handler } from '../../context.ts';
import { readLabels } from '../../scheduling/people.ts';
import { readSchedule } from '../../scheduling/read-schedule.ts';
import { submissionView } from '../../scheduling/submission-view.ts';

const endedShown = 100;

/** Everybody's open work, one's own first; or one's own that has ended. */
export const listSubmissions: Handler<typeof endpoints.listSubmissions> = async ({ ctx, input }) => {
  const { db } = ctx.services;
  const me = ctx.caller.account.id;
  const [schedule, labels] = await Promise.all([readSchedule(db), readLabels(db, ctx.caller)]);
  const rows =
    input.query.open === 'true'
      ? schedule.open.toSorted((a, b) => Number(b.accountId === me) - Number(a.accountId === me))
      : await listEndedSubmissions(db, me, endedShown);
  return { rows: rows.map((row) => submissionView(row, schedule, labels, ctx.caller)) };
};
