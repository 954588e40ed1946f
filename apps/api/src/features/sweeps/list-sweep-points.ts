import type { endpoints, SweepPoint } from '@nightcone/contracts';
import { type Db, findOptionalSweep, listSweepPoints as list, type SweepPointRow } from '@nightcone/db';
import type { Handler } from '../../context.ts';
import { notFound } from '../../refusal.ts';

const page = 2000;

/** All points in the order of the grid; a large sweep is read and written page by page. */
export const listSweepPoints: Handler<typeof endpoints.listSweepPoints> = async ({ ctx, input }) => {
  const { db } = ctx.services;
  const sweep = await findOptionalSweep(db, input.params.id, ctx.caller.account.id);
  if (!sweep) throw notFound('sweep');
  const first = await list(db, sweep.submissionId, { from: 0, limit: page });
  if (first.length < page) return { rows: first.map(pointView) };
  return { type: 'application/json', chunks: pointText(db, sweep.submissionId, first) };
};

const pointView = (row: SweepPointRow): SweepPoint => ({
  index: row.place,
  values: row.values as SweepPoint['values'],
  jobHash: row.jobHash,
  state: row.state,
  resultDigest: row.resultDigest,
  failure: row.failureCode === null ? null : { code: row.failureCode, text: row.failureText ?? '' },
  cpuMs: row.cpuMs,
});

async function* pointText(db: Db, submissionId: string, first: SweepPointRow[]): AsyncGenerator<string> {
  let rows = first;
  let separator = '{"rows":[';
  while (rows.length > 0) {
    yield separator + rows.map((row) => JSON.stringify(pointView(row))).join(',');
    separator = ',';
    const next = (rows.at(-1)?.place ?? 0) + 1;
    rows = rows.length < page ? [] : await list(db, submissionId, { from: next, limit: page });
  }
  yield ']}';
}
