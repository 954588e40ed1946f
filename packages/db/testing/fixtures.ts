import { createHash, randomUUID } from 'node:crypto';
import { sql } from 'drizzle-orm';
import type { Db } from '../src/client.ts';
import { storeKernel } from '../src/queries/kernels/store-kernel.ts';
import type { NewPoint, PlannedJob, Submitter } from '../src/queries/queue/save-submission.ts';
import { type SubmittedSweep, submitSweep } from '../src/queries/queue/submit-sweep.ts';
import { leaseMs, Queue } from '../src/queue.ts';
import type { Chunk, FinishedResult, Order, PartRecord, Task } from '../src/queue-types.ts';
import { accounts } from '../src/schema/accounts.ts';

const sha256 = (data: string | Uint8Array) => createHash('sha256').update(data).digest('hex');

/** An active person, ready to submit. */
export async function createAccount(db: Db, login = `theorist-${randomUUID().slice(0, 8)}`): Promise<Submitter> {
  const [row] = await db
    .insert(accounts)
    .values({ providerId: login, login, name: login, state: 'active' })
    .returning({ id: accounts.id });
  return { accountId: (row as { id: string }).id, requestId: null };
}

/** A kernel in name only: the queue never looks into its bytes. Its digest. */
export async function createKernel(db: Db): Promise<string> {
  const bytes = Buffer.from('not a module: these tests never run it');
  const digest = sha256(bytes);
  await storeKernel(db, { digest, version: '0.0.0-test', bytes, manifest: {}, current: true });
  return digest;
}

/** A job that differs from others by its number. */
export function plannedJob(kernelDigest: string, number: number, more: Partial<PlannedJob> = {}): PlannedJob {
  const canonicalText = JSON.stringify({ kernel: kernelDigest, model: 'landau-levels', parameters: { number } });
  return {
    hash: sha256(canonicalText),
    canonicalText,
    model: 'landau-levels',
    kernelDigest,
    questionDigest: null,
    tables: [],
    estimatedMs: 100,
    slices: 1,
    resultBytes: 100,
    memoryBytes: 1_000_000,
    ...more,
  };
}

export interface SweepOptions {
  /** Numbers of its jobs: sweeps with a number in common share that job. */
  numbers: readonly number[];
  kernel: string;
  tonight?: boolean;
  job?: Partial<PlannedJob>;
  key?: { key: string; requestHash: string } | null;
}

/** A sweep along one axis. */
export function submitTestSweep(
  db: Db,
  submitter: Submitter,
  { numbers, kernel, tonight = false, job = {}, key = null }: SweepOptions,
): Promise<SubmittedSweep> {
  const jobs = numbers.map((number) => plannedJob(kernel, number, job));
  const points = jobs.map(({ hash }, place): NewPoint => ({ jobHash: hash, place, values: [numbers[place]] }));
  return submitSweep(db, submitter, key, {
    title: 'test sweep',
    model: 'landau-levels',
    tonight,
    definition: {
      specification: {},
      axes: [{ pointers: ['/parameters/number'], values: numbers.map((number) => [number]) }],
    },
    jobs: [...new Map(jobs.map((each) => [each.hash, each])).values()],
    points,
  });
}

/** A worker's side of the queue under a name of its own. Stop it at the end of the test. */
export async function startQueue(url: string, { slots = 2, speedFactor = 1 } = {}): Promise<Queue> {
  const id = `worker-${randomUUID().slice(0, 8)}`;
  const queue = new Queue({
    connectionString: url,
    worker: { id, host: 'test', pid: process.pid, slots, memoryBytes: 4e9, speedFactor },
  });
  await queue.start();
  return queue;
}

export const anySlot = { express: false, memoryBytes: 4e9 };

/** What a kernel would find for a job: always the same for the same `seed`. */
export function resultOf(seed: string): FinishedResult {
  const data = Buffer.from(seed);
  const digest = sha256(`result of ${seed}`);
  const array = { name: 'energies', dtype: 'u8' as const, dims: ['level'], unit: '1' };
  return {
    digest,
    arrays: [{ ...array, shape: [data.length], sha256: sha256(data), bytes: data.length }],
    certificate: { numbers: { residual: 0 }, checks: [] },
    data: [data],
  };
}

/** The record that a worker would write for a task. */
export function recordOf(task: Task, cpuUs = 100_000): PartRecord {
  const { index, kind, jobHash, sliceFrom, sliceTo } = task;
  if (kind !== 'part') return { index, cpuUs, outcome: 'result', result: resultOf(jobHash) };
  const payloads = Array.from({ length: sliceTo - sliceFrom }, (_, i) => Buffer.from(`slice ${sliceFrom + i}`));
  return { index, cpuUs, outcome: 'payloads', payloads };
}

/** Computes a whole chunk in good order. */
export async function workOff(queue: Queue, chunk: Chunk, cpuUs?: number): Promise<Order> {
  const order = await queue.record(
    chunk,
    chunk.tasks.map((task) => recordOf(task, cpuUs)),
  );
  await queue.finish(chunk);
  return order;
}

/** Works until the queue has nothing more for this slot; how many parts. */
export async function drain(queue: Queue, cpuUs?: number): Promise<number> {
  let parts = 0;
  for (let chunk = await queue.next(anySlot); chunk; chunk = await queue.next(anySlot)) {
    parts += chunk.tasks.length;
    await workOff(queue, chunk, cpuUs);
  }
  return parts;
}

/** Balances that are not the sum of their entries, submissions that hold more than their balance: must be empty. */
export async function ledgerErrors(db: Db): Promise<unknown[]> {
  const { rows } = await db.execute(sql`
    select b.id from quota_balances b left join lateral (
      select sum(granted_ms) as g, sum(reserved_ms) as r, sum(used_ms) as u from quota_entries e where e.balance_id = b.id) e on true
     where (b.granted_ms, b.reserved_ms, b.used_ms) <> (e.g, e.r, e.u)
        or b.reserved_ms <> coalesce((select sum(s.reserved_ms) from submissions s where s.balance_id = b.id), 0)
        or b.used_ms <> coalesce((select sum(s.used_us / 1000) from submissions s where s.balance_id = b.id), 0)`);
  return rows;
}

/** The pause before the next attempt is over. */
export async function endRetryPauses(db: Db): Promise<void> {
  await db.execute(sql`update pgboss.job set start_after = now() - interval '1 s' where state = 'retry'`);
}

/** All leases had their last heartbeat too long ago. */
export async function ageLeases(db: Db): Promise<void> {
  await db.execute(sql`update leases set beat_at = now() - interval '1 hour'`);
}

/** A chunk that must be there. */
export async function takeChunk(queue: Queue, offer = anySlot): Promise<Chunk> {
  const chunk = await queue.next(offer);
  if (!chunk) throw new Error('the queue has nothing for this slot');
  return chunk;
}

/** The reaper, as if the database had been in reach for one lease time: how many leases it took. */
export async function reapNow(queue: Queue): Promise<number> {
  const clock = Date.now;
  Date.now = () => clock() + leaseMs + 1;
  try {
    return await queue.reap();
  } finally {
    Date.now = clock;
  }
}
