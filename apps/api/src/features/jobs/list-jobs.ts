import type { endpoints } from '@nightcone/contracts';
import { type JobSummaryRow, listJobs as list } from '@nightcone/db';
import type { Handler } from '../../context.ts';
import { decodeCursor, encodeCursor } from '../../page-cursor.ts';
import { Refusal } from '../../refusal.ts';
import { readLabels } from '../../scheduling/people.ts';
import { jobSummary } from './job-view.ts';

type Query = { sort: 'createdAt' | 'finishedAt' | 'cpuMs' | 'model'; direction: 'ascending' | 'descending' };

export const listJobs: Handler<typeof endpoints.listJobs> = async ({ ctx, input }) => {
  const { db } = ctx.services;
  const { limit, cursor, mine, sort, direction, ...filter } = input.query;
  const labels = await readLabels(db, ctx.caller);
  const { rows, total } = await list(db, {
    ...filter,
    sort,
    direction,
    viewer: ctx.caller.account.id,
    mine: mine === undefined ? undefined : mine === 'true',
    limit: limit + 1,
    after: readCursor(cursor, { sort, direction }),
  });
  const page = rows.slice(0, limit);
  const last = rows.length > limit ? page.at(-1) : undefined;
  return {
    rows: page.map((row) => jobSummary(row, labels)),
    total,
    nextCursor: last ? encodeCursor([`${sort} ${direction}`, keyOf(last, sort), last.hash]) : null,
  };
};

const keyOf = (row: JobSummaryRow, sort: Query['sort']): string | number =>
  ({
    createdAt: row.createdAt.toISOString(),
    finishedAt: (row.finishedAt ?? new Date(0)).toISOString(),
    cpuMs: row.cpuMs ?? 0,
    model: row.model,
  })[sort];

/** A cursor belongs to one order of the list; under another it would skip rows silently. */
function readCursor(
  cursor: string | undefined,
  { sort, direction }: Query,
): [string | number | null, string] | undefined {
  const parts = decodeCursor(cursor);
  if (!parts) return undefined;
  const [order, key, hash] = parts;
  const isInstant = sort === 'createdAt' || sort === 'finishedAt';
  const fits =
    typeof hash === 'string' &&
    (sort === 'cpuMs' ? typeof key === 'number' : typeof key === 'string') &&
    (!isInstant || !Number.isNaN(new Date(key as string).getTime()));
  if (order !== `${sort} ${direction}` || !fits)
    throw new Refusal('invalid-input', 'cursor: it belongs to another order of this list.', {
      errors: [{ field: 'cursor', message: 'It belongs to another order of this list.' }],
    });
  return [key ?? null, hash];
}
