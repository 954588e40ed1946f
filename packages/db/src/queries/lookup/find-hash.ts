import { sql } from 'drizzle-orm';
import type { Queryable } from '../../client.ts';

export interface HashHit {
  kind: 'job' | 'result' | 'kernel' | 'table';
  hash: string;
  /** Model of a job or result, version of a kernel, name of a table. */
  name: string;
  specification: unknown;
  /** Job of a result. */
  jobHash: string | null;
}

/** Everything under the first digits of a digest (at least 12 of them) that this person may open; the first 20. */
export async function listHashHits(db: Queryable, digits: string, viewer: string): Promise<HashHit[]> {
  const from = digits.padEnd(64, '0');
  const to = digits.padEnd(64, 'f');
  const mayOpen = sql`not exists (select from unnest(j.table_digests) needed where not exists (
    select from table_holdings h where h.table_digest = needed and h.account_id = ${viewer}))`;
  const { rows } = await db.execute<Record<string, unknown>>(sql`
    select * from (
      select 'job' as kind, j.hash, j.model as name, j.specification, j.hash as job_hash
        from jobs j where j.hash between ${from} and ${to} and ${mayOpen}
      union all
      select 'result', r.digest, j.model, j.specification, j.hash
        from results r cross join lateral (
          select j.* from jobs j where ${mayOpen} and (j.result_digest = r.digest
            or exists (select from executions e where e.job_hash = j.hash and e.result_digest = r.digest))
          order by j.created_at limit 1) j
        where r.digest between ${from} and ${to}
      union all
      select 'kernel', k.digest, k.version, null, null from kernels k where k.digest between ${from} and ${to}
      union all
      select 'table', h.table_digest, min(h.name), null, null from table_holdings h
        where h.account_id = ${viewer} and h.table_digest between ${from} and ${to} group by h.table_digest
    ) hits order by kind, hash limit 20`);
  return rows.map((row) => ({
    kind: row.kind as HashHit['kind'],
    hash: row.hash as string,
    name: row.name as string,
    specification: row.specification,
    jobHash: row.job_hash as string | null,
  }));
}
