import type { endpoints, SweepPoint } from '@nightcone/contracts';
import { findOptionalSweep, listSweepPoints as list, type SweepPointRow } from '@nightcone/db';
import { breathing } from '../../breathing.ts';
import type { Handler } from '../../context.ts';
import { notFound } from '../../refusal.ts';

/** Rows turned into text at once. */
const pieceRows = 1000;

/** All points in the order of the grid; of a large sweep the text is made in pieces. */
export const listSweepPoints: Handler<typeof endpoints.listSweepPoints> = async ({ ctx, input }) => {
  const { db } = ctx.services;
  const sweep = await findOptionalSweep(db, input.params.id, ctx.caller.account.id);
  if (!sweep) throw notFound('sweep');
  const rows = await list(db, sweep.submissionId);
  if (rows.length <= pieceRows) return { rows: rows.map(pointView) };
  return { type: 'application/json', chunks: breathing(pointText(rows)) };
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

function* pointText(rows: readonly SweepPointRow[]): Generator<string> {
  for (let at = 0; at < rows.length; at += pieceRows) {
    const piece = rows.slice(at, at + pieceRows).map((row) => JSON.stringify(pointView(row)));
    yield (at === 0 ? '{"rows":[' : ',') + piece.join(',');
  }
  yield ']}';
}
