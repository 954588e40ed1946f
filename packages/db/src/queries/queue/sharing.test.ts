import { sql } from 'drizzle-orm';
import { afterEach, beforeEach, expect, test } from 'vitest';
import {
  anySlot,
  createAccount,
  createKernel,
  createTestDatabase,
  drain,
  ledgerErrors,
  plannedJob,
  resultOf,
  startQueue,
  submitTestSweep,
  type TestDatabase,
  takeChunk,
  workOff,
} from '../../../testing/index.ts';
import type { Queue } from '../../queue.ts';
import { findQuota } from '../quotas/find-quota.ts';
import { cancelSubmission } from './control-submission.ts';
import type { Submitter } from './save-submission.ts';
import { submitJob } from './submit-job.ts';
import { submitRerun } from './submit-rerun.ts';

let database: TestDatabase;
let kernel: string;
let theorist: Submitter;
let other: Submitter;
let queue: Queue;

beforeEach(async () => {
  database = await createTestDatabase();
  kernel = await createKernel(database.db);
  theorist = await createAccount(database.db);
  other = await createAccount(database.db);
  queue = await startQueue(database.url);
});
afterEach(async () => {
  await queue.stop();
  await database.drop();
});

const states = async (id: string) => {
  const { rows } = await database.db.execute<{ state: string; n: number }>(
    sql`select state, count(*)::int as n from point_states where submission_id = ${id} group by state order by state`,
  );
  return Object.fromEntries(rows.map(({ state, n }) => [state, n]));
};
const stateOf = async (table: 'jobs' | 'submissions' | 'executions', key: string, id: string) => {
  const { rows } = await database.db.execute(
    sql`select state from ${sql.identifier(table)} where ${sql.identifier(key)} = ${id}`,
  );
  return rows[0]?.state;
};

test('a job that was computed before is taken out at submission and costs nothing', async () => {
  await submitTestSweep(database.db, theorist, { kernel, numbers: [1, 2, 3] });
  await drain(queue);
  const again = await submitTestSweep(database.db, other, { kernel, numbers: [2, 3, 4] });
  expect(again).toMatchObject({ jobs: 3, alreadyComputed: 2 });
  expect(await states(again.submissionId)).toEqual({ reused: 2, waiting: 1 });
  expect(await findQuota(database.db, other.accountId)).toMatchObject({ reservedMs: 100 });
  expect(await drain(queue)).toBe(1);
  expect(await findQuota(database.db, other.accountId)).toMatchObject({ reservedMs: 0, usedMs: 100 });
});

test('a point is parked while somebody else computes its job, then reused', async () => {
  const first = await submitTestSweep(database.db, theorist, { kernel, numbers: [1] });
  const chunk = await takeChunk(queue);
  const second = await submitTestSweep(database.db, other, { kernel, numbers: [1] });
  expect(await queue.next(anySlot)).toBeNull();
  expect(await states(second.submissionId)).toEqual({ parked: 1 });
  expect(await stateOf('submissions', 'id', second.submissionId)).toBe('active');
  await workOff(queue, chunk);
  expect(await queue.next(anySlot)).toBeNull();
  expect(await states(first.submissionId)).toEqual({ finished: 1 });
  expect(await states(second.submissionId)).toEqual({ reused: 1 });
  expect(await stateOf('submissions', 'id', second.submissionId)).toBe('done');
  expect(await findQuota(database.db, other.accountId)).toMatchObject({ reservedMs: 0, usedMs: 0 });
  expect(await ledgerErrors(database.db)).toEqual([]);
});

test('a parked point returns to the backlog when the other one ends without a result', async () => {
  const first = await submitTestSweep(database.db, theorist, { kernel, numbers: [1] });
  const chunk = await takeChunk(queue);
  const second = await submitTestSweep(database.db, other, { kernel, numbers: [1] });
  expect(await queue.next(anySlot)).toBeNull();
  await cancelSubmission(database.db, theorist, first.submissionId);
  expect([...(await queue.beat([{ chunk, cpuUs: 0, fraction: 0 }])).values()]).toEqual(['cancel']);
  await queue.finish(chunk);
  expect(await drain(queue)).toBe(1);
  expect(await states(second.submissionId)).toEqual({ finished: 1 });
});

test('two people with the same sweep share the work: every job is computed once', async () => {
  const numbers = Array.from({ length: 50 }, (_, i) => i);
  const a = await submitTestSweep(database.db, theorist, { kernel, numbers });
  const b = await submitTestSweep(database.db, other, { kernel, numbers });
  const slot = async () => {
    let parts = 0;
    for (let chunk = await queue.next(anySlot); chunk; chunk = await queue.next(anySlot)) {
      parts += chunk.tasks.length;
      await workOff(queue, chunk);
    }
    return parts;
  };
  const [left, right] = await Promise.all([slot(), slot()]);
  expect(left + right + (await slot())).toBe(50);
  for (const { submissionId } of [a, b]) expect(await stateOf('submissions', 'id', submissionId)).toBe('done');
  expect(await ledgerErrors(database.db)).toEqual([]);
});

test('a re-run computes again, whatever is stored, and compares', async () => {
  const job = plannedJob(kernel, 1);
  await submitJob(database.db, theorist, null, { title: 'one', tonight: false, job });
  await drain(queue);
  const rerun = await submitRerun(database.db, other, null, { jobHash: job.hash, title: 'again' });
  const chunk = await takeChunk(queue);
  expect(chunk.tasks).toMatchObject([{ executionId: rerun?.executionId, kind: 'whole' }]);
  await workOff(queue, chunk);
  expect(await stateOf('executions', 'id', rerun?.executionId ?? '')).toBe('finished');
  expect(await stateOf('jobs', 'hash', job.hash)).toBe('finished');
});

test('other bits under the same kernel: the job is disputed, both results are kept, the log says so', async () => {
  const job = plannedJob(kernel, 1);
  await submitJob(database.db, theorist, null, { title: 'one', tonight: false, job });
  await drain(queue);
  await submitRerun(database.db, other, null, { jobHash: job.hash, title: 'again' });
  const chunk = await takeChunk(queue);
  await queue.record(chunk, [{ index: 0, cpuUs: 1, outcome: 'result', result: resultOf('other bits') }]);
  await queue.finish(chunk);
  const { rows } = await database.db.execute(sql`
    select j.state, j.result_digest, (select count(*)::int from results) as results,
           (select count(distinct result_digest)::int from executions) as digests,
           (select count(*)::int from audit_entries where action = 'jobs.dispute' and subject_id = j.hash) as told
      from jobs j where j.hash = ${job.hash}`);
  expect(rows).toEqual([
    { state: 'disputed', result_digest: resultOf(job.hash).digest, results: 2, digests: 2, told: 1 },
  ]);
});

test('a re-run does not wait for, nor is waited for by, the same job in flight', async () => {
  const job = plannedJob(kernel, 1);
  await submitJob(database.db, theorist, null, { title: 'one', tonight: false, job });
  const first = await takeChunk(queue);
  await submitRerun(database.db, theorist, null, { jobHash: job.hash, title: 'again' });
  const second = await takeChunk(queue);
  expect(second.tasks[0]?.jobHash).toBe(first.tasks[0]?.jobHash);
  await workOff(queue, second);
  await workOff(queue, first);
  expect(await stateOf('jobs', 'hash', job.hash)).toBe('finished');
});

test('equal arrays of different results are stored once', async () => {
  await submitTestSweep(database.db, theorist, { kernel, numbers: [1, 2] });
  for (let chunk = await queue.next(anySlot); chunk; chunk = await queue.next(anySlot)) {
    await queue.record(
      chunk,
      chunk.tasks.map(({ index }) => {
        const { arrays, ...rest } = resultOf('common');
        const digest = `${'0'.repeat(63)}${index}`;
        return { index, cpuUs: 1, outcome: 'result', result: { ...rest, arrays, digest } };
      }),
    );
    await queue.finish(chunk);
  }
  const { rows } = await database.db.execute(sql`
    select (select count(*)::int from results) as results, (select count(*)::int from result_arrays) as arrays`);
  expect(rows).toEqual([{ results: 2, arrays: 1 }]);
});
