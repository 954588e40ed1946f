import type { PointState } from '@nightcone/contracts';
import { and, count, desc, eq, getTableColumns, type SQL, sql } from 'drizzle-orm';
import type { Queryable } from '../../client.ts';
import { sweeps } from '../../schema/sweeps.ts';

const { definition: _, ...lean } = getTableColumns(sweeps);
export type SweepRow = typeof sweeps.$inferSelect;
export type LeanSweepRow = Omit<SweepRow, 'definition'>;

/** Another person's sweep is as unknown as none. */
export async function findOptionalSweep(db: Queryable, id: string, ownerId: string): Promise<SweepRow | undefined> {
  const [row] = await db
    .select()
    .from(sweeps)
    .where(and(eq(sweeps.id, id), eq(sweeps.ownerId, ownerId)));
  return row;
}

/** The newest first. */
export async function listSweeps(
  db: Queryable,
  { ownerId, limit, after }: { ownerId: string; limit: number; after?: [Date, string] },
) {
  const createdMs = sql`date_trunc('milliseconds', ${sweeps.createdAt})`;
  const owned = eq(sweeps.ownerId, ownerId);
  const beyond: SQL | undefined =
    after && sql`(${createdMs}, ${sweeps.id}) < (${after[0].toISOString()}::timestamptz, ${after[1]}::uuid)`;
  const [rows, [total]] = await Promise.all([
    db.select(lean).from(sweeps).where(and(owned, beyond)).orderBy(desc(createdMs), desc(sweeps.id)).limit(limit),
    db.select({ rows: count() }).from(sweeps).where(owned),
  ]);
  return { rows, total: total?.rows ?? 0 };
}

/** How many points of each submission are in each state; states without points are left out. */
export async function countPointStates(
  db: Queryable,
  submissionIds: readonly string[],
): Promise<Map<string, Partial<Record<PointState, number>>>> {
  const counts = new Map<string, Partial<Record<PointState, number>>>(submissionIds.map((id) => [id, {}]));
  if (submissionIds.length === 0) return counts;
  const { rows } = await db.execute<{ id: string; state: PointState; points: string }>(sql`
    select submission_id as id, state, count(*) as points from point_states
    where submission_id = any(${sql.param([...submissionIds])}::uuid[]) group by 1, 2`);
  for (const { id, state, points } of rows) {
    const known = counts.get(id);
    if (known) known[state] = Number(points);
  }
  return counts;
}

export interface SweepPointRow {
  place: number;
  values: unknown[];
  jobHash: string;
  state: PointState;
  resultDigest: string | null;
  failureCode: string | null;
  failureText: string | null;
  cpuMs: number | null;
}

/**
 * Points of a sweep in the order of the grid. A broken-off point tells how its last execution here ended; a failed one
 * why its job fails.
 */
export async function listSweepPoints(db: Queryable, submissionId: string): Promise<SweepPointRow[]> {
  const { rows } = await db.execute<Record<keyof SweepPointRow, unknown>>(sql`
    select p.place, p.swept_values as "values", p.job_hash as "jobHash", p.state, j.result_digest as "resultDigest",
           coalesce(e.failure_code, case when p.state = 'failed' then j.failure_code end) as "failureCode",
           coalesce(e.failure_text, case when p.state = 'failed' then j.failure_text end) as "failureText", j.cpu_ms as "cpuMs"
      from point_states p join jobs j on j.hash = p.job_hash
      left join lateral (select x.failure_code, x.failure_text from executions x
        where p.state = 'broken-off' and x.submission_id = p.submission_id and x.point = p.point and x.failure_code is not null
        order by x.finished_at desc limit 1) e on true
     where p.submission_id = ${submissionId} order by p.place`);
  return rows as unknown as SweepPointRow[];
}

/** Finished points of a sweep with what its results say of one array. */
export async function listPointArrays(db: Queryable, submissionId: string, array: string) {
  const { rows } = await db.execute<{ place: number; arrays: unknown }>(sql`
    select sp.place, (select jsonb_agg(a) from jsonb_array_elements(r.arrays) a
        where a->>'name' = ${array} or a->>'name' = (select b->>'ragged' from jsonb_array_elements(r.arrays) b where b->>'name' = ${array})) as arrays
      from submission_points sp join jobs j on j.hash = sp.job_hash join results r on r.digest = j.result_digest and r.state = 'kept'
     where sp.submission_id = ${submissionId} and sp.outcome in ('finished', 'reused')
     order by sp.place`);
  return rows;
}
