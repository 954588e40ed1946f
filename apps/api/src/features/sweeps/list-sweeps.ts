import type { endpoints } from '@nightcone/contracts';
import { countPointStates, listSweeps as list, listSubmissionsById } from '@nightcone/db';
import type { Handler } from '../../context.ts';
import { instantCursor, nextCursor } from '../../page-cursor.ts';
import { readLabels } from '../../scheduling/people.ts';
import { readSchedule } from '../../scheduling/read-schedule.ts';
import { sweepView } from './sweep-view.ts';

export const listSweeps: Handler<typeof endpoints.listSweeps> = async ({ ctx, input }) => {
  const { db } = ctx.services;
  const { limit, cursor } = input.query;
  const ownerId = ctx.caller.account.id;
  const { rows, total } = await list(db, { ownerId, limit: limit + 1, after: instantCursor(cursor) });
  const page = rows.slice(0, limit);
  const ids = page.map(({ submissionId }) => submissionId);
  const [schedule, labels, submissions, counts] = await Promise.all([
    readSchedule(db),
    readLabels(db, ctx.caller),
    listSubmissionsById(db, ids),
    countPointStates(db, ids),
  ]);
  const byId = new Map(submissions.map((row) => [row.id, row]));
  return {
    rows: page.flatMap((row) => {
      const submission = byId.get(row.submissionId);
      const states = counts.get(row.submissionId) ?? {};
      return submission ? [sweepView(row, submission, states, { schedule, labels, caller: ctx.caller })] : [];
    }),
    total,
    nextCursor: nextCursor(rows.length > limit ? page.at(-1) : undefined, (row) => [row.createdAt, row.id]),
  };
};
