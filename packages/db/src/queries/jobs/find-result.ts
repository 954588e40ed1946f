import { and, eq, sql } from 'drizzle-orm';
import type { Queryable } from '../../client.ts';
import { jobs } from '../../schema/jobs/jobs.ts';
import { resultArrayRows, results } from '../../schema/jobs/results.ts';
import { mayOpen } from './visible-jobs.ts';

/** A result of a job, or of a re-run of one, that this person may open. */
export async function findOptionalResult(db: Queryable, digest: string, viewer: string) {
  const [row] = await db
    .select()
    .from(results)
    .where(
      and(
        eq(results.digest, digest),
        sql`exists (select from jobs where ${mayOpen(viewer)} and (${jobs.resultDigest} = ${results.digest}
          or exists (select from executions e where e.job_hash = ${jobs.hash} and e.result_digest = ${results.digest})))`,
      ),
    );
  return row;
}

/** The bytes of an array, one stored row (at most 4 MiB) after the other: the reader's pace is the database's. */
export async function* readArrayRows(db: Queryable, sha256: string): AsyncGenerator<Buffer> {
  for (let number = 0; ; number++) {
    const [row] = await db
      .select({ data: resultArrayRows.data })
      .from(resultArrayRows)
      .where(and(eq(resultArrayRows.sha256, sha256), eq(resultArrayRows.number, number)));
    if (!row) return;
    yield row.data;
  }
}

/** A whole array; for those that are small beside a request. */
export async function readArray(db: Queryable, sha256: string): Promise<Buffer> {
  const rows: Buffer[] = [];
  for await (const row of readArrayRows(db, sha256)) rows.push(row);
  return rows.length === 1 ? (rows[0] as Buffer) : Buffer.concat(rows);
}

const rowBytes = 4_194_304;
const batch = 500;

export interface ArraySlice {
  sha256: string;
  /** In bytes. */
  from: number;
  length: number;
}

/** Pieces of many arrays at once, in the order asked for; a piece that is not stored comes back short. */
export async function readArraySlices(db: Queryable, slices: readonly ArraySlice[]): Promise<Buffer[]> {
  // A slice that runs over the end of a stored row is cut there and put together again.
  const pieces = slices.flatMap(({ sha256, from, length }, slice) => {
    const cut: { slice: number; sha256: string; number: number; offset: number; size: number }[] = [];
    for (let at = from; at < from + length; ) {
      const number = Math.floor(at / rowBytes);
      const offset = at - number * rowBytes;
      const size = Math.min(from + length - at, rowBytes - offset);
      cut.push({ slice, sha256, number, offset, size });
      at += size;
    }
    return cut;
  });
  const found: Buffer[][] = slices.map(() => []);
  for (let at = 0; at < pieces.length; at += batch) {
    const asked = pieces.slice(at, at + batch);
    const column = <K extends keyof (typeof asked)[number]>(key: K) => sql.param(asked.map((piece) => piece[key]));
    const { rows } = await db.execute<{ slice: number; data: Buffer }>(sql`
      select t.slice, substring(r.data from t.start + 1 for t.size) as data
        from unnest(${column('slice')}::int[], ${column('sha256')}::text[], ${column('number')}::int[],
                    ${column('offset')}::int[], ${column('size')}::int[]) with ordinality
             as t(slice, sha256, number, start, size, n)
        join result_array_rows r on r.sha256 = t.sha256 and r.number = t.number order by t.n`);
    for (const { slice, data } of rows) found[slice]?.push(data);
  }
  return found.map((parts) => (parts.length === 1 ? (parts[0] as Buffer) : Buffer.concat(parts)));
}
