import { and, eq, sql } from 'drizzle-orm';
import type { Queryable } from '../../client.ts';
import { jobs } from '../../schema/jobs.ts';
import { resultArrayRows, results } from '../../schema/results.ts';
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

/** Bytes [from, from + length) of an array that lie in one stored row. */
const rowBytes = 4_194_304;

export async function readArraySlice(db: Queryable, sha256: string, from: number, length: number): Promise<Buffer> {
  const pieces: Buffer[] = [];
  for (let at = from; at < from + length; ) {
    const number = Math.floor(at / rowBytes);
    const offset = at - number * rowBytes;
    const size = Math.min(from + length - at, rowBytes - offset);
    const [row] = await db
      .select({ data: sql<Buffer>`substring(${resultArrayRows.data} from ${offset + 1}::int for ${size}::int)` })
      .from(resultArrayRows)
      .where(and(eq(resultArrayRows.sha256, sha256), eq(resultArrayRows.number, number)));
    if (!row || row.data.length === 0) break;
    pieces.push(row.data);
    at += row.data.length;
  }
  return Buffer.concat(pieces);
}
