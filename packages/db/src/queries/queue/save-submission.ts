import { sql } from 'drizzle-orm';
import type { Transaction } from '../../client.ts';
import { QuotaExceeded } from '../../errors.ts';
import type { submissionKinds } from '../../schema/queue/submissions.ts';
import type { Actor } from '../audit.ts';

/** One job as it was planned. Milliseconds are reference CPU. */
export interface PlannedJob {
  hash: string;
  canonicalText: string;
  model: string;
  kernelDigest: string;
  questionDigest: string | null;
  tables: readonly string[];
  estimatedMs: number;
  slices: number;
  resultBytes: number;
  /** Peak memory of a slice or of the assembly, whichever is larger. */
  memoryBytes: number;
}

export interface NewPoint {
  jobHash: string;
  place: number;
  values: readonly unknown[];
}

export interface NewSubmission {
  kind: (typeof submissionKinds)[number];
  title: string;
  model: string;
  tonight: boolean;
  priority?: number;
  /** In computing order. */
  points: readonly NewPoint[];
}

/** Who submits. */
export type Submitter = Actor & { accountId: string };

const batchSize = 2_000;
function* batches<T>(rows: readonly T[]): Generator<string> {
  for (let at = 0; at < rows.length; at += batchSize) yield JSON.stringify(rows.slice(at, at + batchSize));
}

/** Jobs that are not there yet; in order of their hashes, so that two sweeps with common jobs never wait in a ring. */
export async function saveJobs(tx: Transaction, submitter: Submitter, jobs: readonly PlannedJob[]): Promise<void> {
  const ordered = [...jobs].sort((a, b) => (a.hash < b.hash ? -1 : 1));
  for (const batch of batches(ordered)) {
    await tx.execute(sql`
      insert into jobs (hash, canonical_text, model, kernel_digest, question_digest, table_digests, estimated_ms, slices,
                        result_bytes, memory_bytes, first_submitted_by)
      select hash, "canonicalText", model, "kernelDigest", "questionDigest", tables, "estimatedMs", slices,
             "resultBytes", "memoryBytes", ${submitter.accountId}::uuid
        from json_to_recordset(${batch}::json) as t(hash text, "canonicalText" text, model text, "kernelDigest" text,
             "questionDigest" text, tables text[], "estimatedMs" float8, slices int, "resultBytes" bigint, "memoryBytes" bigint)
      on conflict (hash) do nothing`);
  }
}

/**
 * Saves what someone asked for: points, backlog, reservation. Jobs that are known already are taken out, except in a
 * re-run. Throws QuotaExceeded. Returns the id, and how many points were known.
 */
export async function saveSubmission(tx: Transaction, submitter: Submitter, asked: NewSubmission) {
  const { accountId } = submitter;
  await tx.execute(sql`insert into turns (account_id) values (${accountId}) on conflict do nothing`);
  const { rows: opened } = await tx.execute<{ id: string; balanceId: string }>(sql`
    insert into submissions (kind, account_id, balance_id, title, model, tonight, priority, points, parts_per_job, todo,
                             total_slices, estimated_ms, part_ms, memory_bytes, reserved_at_start_ms, reserved_ms)
    values (${asked.kind}, ${accountId}, queue.balance_of(${accountId}), ${asked.title}, ${asked.model}, ${asked.tonight},
            ${asked.priority ?? 0}, ${asked.points.length}, 1, '{}', 0, 0, 0, 0, 0, 0)
    returning id, balance_id as "balanceId"`);
  const { id, balanceId } = opened[0] as { id: string; balanceId: string };
  await savePoints(tx, id, asked);
  const { rows: counted } = await tx.execute<{ known: number; reservedMs: string }>(
    sql`select known, reserved_ms as "reservedMs" from queue.open(${id})`,
  );
  const { known, reservedMs } = counted[0] as { known: number; reservedMs: string };
  const { rows: reserved } = await tx.execute<{ fits: boolean; freeMs: string }>(sql`
    select granted_ms - used_ms - reserved_ms as "freeMs", queue.reserve(id, ${reservedMs}, ${asked.title}, ${id}) as fits
      from quota_balances where id = ${balanceId}`);
  const [answer] = reserved;
  if (!answer?.fits) throw new QuotaExceeded(Number(reservedMs), Math.max(0, Number(answer?.freeMs ?? 0)));
  return { submissionId: id, alreadyComputed: known };
}

async function savePoints(tx: Transaction, submissionId: string, { kind, points }: NewSubmission): Promise<void> {
  let first = 0;
  for (const batch of batches(points)) {
    await tx.execute(sql`
      insert into submission_points (submission_id, point, job_hash, place, swept_values, outcome)
      select ${submissionId}::uuid, ${first}::int + t.n - 1, t.row->>'jobHash', (t.row->>'place')::int, t.row->'values',
             case when ${kind} <> 're-run' then case j.state when 'finished' then 'reused' when 'disputed' then 'reused' when 'failed' then 'failed' end end
        from jsonb_array_elements(${batch}::jsonb) with ordinality as t(row, n) left join jobs j on j.hash = t.row->>'jobHash'`);
    first += batchSize;
  }
}
