import { sql } from 'drizzle-orm';
import type { Queryable } from '../../client.ts';

export interface NightRow {
  submissionId: string;
  sweepId: string | null;
  jobHash: string | null;
  title: string;
  model: string;
  finished: number;
  failed: number;
  total: number;
}

/** One person's work that ended points between two instants, and how. */
export async function listNightRows(db: Queryable, accountId: string, from: Date, to: Date): Promise<NightRow[]> {
  const { rows } = await db.execute<Record<keyof NightRow, unknown>>(sql`
    select s.id as "submissionId", w.id as "sweepId", case when w.id is null then min(e.job_hash) end as "jobHash",
           s.title, s.model, count(*) filter (where e.state = 'finished') as finished,
           count(*) filter (where e.state in ('failed', 'broken-off')) as failed, s.points as total
      from executions e join submissions s on s.id = e.submission_id left join sweeps w on w.submission_id = s.id
     where s.account_id = ${accountId} and e.finished_at >= ${from.toISOString()} and e.finished_at < ${to.toISOString()}
       and e.state in ('finished', 'failed', 'broken-off')
     group by s.id, w.id order by s.created_at`);
  return rows.map((row) => ({
    ...(row as unknown as NightRow),
    finished: Number(row.finished),
    failed: Number(row.failed),
    total: Number(row.total),
  }));
}

/** Certificates of what finished: the largest residual, and how many checks were made and held. */
export async function findNightQuality(db: Queryable, accountId: string, from: Date, to: Date) {
  const { rows } = await db.execute<Record<string, unknown>>(sql`
    with ended as (
      select distinct e.result_digest from executions e join submissions s on s.id = e.submission_id
       where s.account_id = ${accountId} and e.state = 'finished'
         and e.finished_at >= ${from.toISOString()} and e.finished_at < ${to.toISOString()}),
    certificates as (select r.certificate from results r join ended on ended.result_digest = r.digest)
    select (select max(n.value::float8) from certificates, jsonb_each_text(certificate->'numbers') n
              where n.key ilike '%residual%') as residual,
           (select count(*) from certificates, jsonb_array_elements(certificate->'checks') c) as made,
           (select count(*) from certificates, jsonb_array_elements(certificate->'checks') c where (c->>'holds')::boolean) as held`);
  const [row] = rows;
  return {
    largestResidual: row?.residual === null || row?.residual === undefined ? null : Number(row.residual),
    checksMade: Number(row?.made ?? 0),
    checksHeld: Number(row?.held ?? 0),
  };
}

export async function listNightFailures(db: Queryable, accountId: string, from: Date, to: Date) {
  const { rows } = await db.execute<{ code: string; text: string; points: string; sweepId: string | null }>(sql`
    select e.failure_code as code, min(coalesce(e.failure_text, '')) as text, count(*) as points, w.id as "sweepId"
      from executions e join submissions s on s.id = e.submission_id left join sweeps w on w.submission_id = s.id
     where s.account_id = ${accountId} and e.state in ('failed', 'broken-off')
       and e.finished_at >= ${from.toISOString()} and e.finished_at < ${to.toISOString()}
     group by 1, 4 order by 3 desc limit 50`);
  return rows.map(({ points, ...row }) => ({ ...row, points: Number(points) }));
}

/** What the night took from the quota and gave back to it. */
export async function findNightUse(db: Queryable, accountId: string, from: Date, to: Date) {
  const { rows } = await db.execute<{ used: string; returned: string }>(sql`
    select coalesce(sum(q.used_ms), 0) as used,
           coalesce(-sum(q.reserved_ms) filter (where q.kind = 'release'), 0) as returned
      from quota_entries q join quota_balances b on b.id = q.balance_id
     where b.account_id = ${accountId} and q.at >= ${from.toISOString()} and q.at < ${to.toISOString()}`);
  return { usedMs: Number(rows[0]?.used ?? 0), returnedMs: Number(rows[0]?.returned ?? 0) };
}
