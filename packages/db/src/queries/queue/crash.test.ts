import { sql } from 'drizzle-orm';
import { afterEach, beforeEach, expect, test } from 'vitest';
import {
  anySlot,
  createAccount,
  createKernel,
  createTestDatabase,
  drain,
  endRetryPauses,
  ledgerErrors,
  recordOf,
  startQueue,
  submitTestSweep,
  type TestDatabase,
  takeChunk,
  workOff,
} from '../../../testing/index.ts';
import type { Queue } from '../../queue.ts';
import { findQuota } from '../quotas/find-quota.ts';
import { retryBrokenOff } from './control-submission.ts';
import type { Submitter } from './save-submission.ts';

let database: TestDatabase;
let kernel: string;
let theorist: Submitter;
let queue: Queue;

beforeEach(async () => {
  database = await createTestDatabase();
  kernel = await createKernel(database.db);
  theorist = await createAccount(database.db);
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

/** Works like a machine whose slot dies whenever it comes to one job. Ends when the queue has nothing more. */
async function workWithPoison(poison: string): Promise<number> {
  let crashes = 0;
  for (;;) {
    await endRetryPauses(database.db);
    const chunk = await queue.next(anySlot);
    if (!chunk) return crashes;
    const at = chunk.tasks.findIndex(({ jobHash }) => jobHash === poison);
    const done = at < 0 ? chunk.tasks : chunk.tasks.slice(0, at);
    if (done.length > 0)
      await queue.record(
        chunk,
        done.map((task) => recordOf(task)),
      );
    if (at < 0) await queue.finish(chunk);
    else {
      crashes++;
      await queue.crash(chunk, 'the slot ended with code 134', done.length * 100_000 + 50_000);
    }
  }
}

const jobAt = async (submission: string, point: number) => {
  const { rows } = await database.db.execute<{ hash: string }>(
    sql`select job_hash as hash from submission_points where submission_id = ${submission} and point = ${point}`,
  );
  return (rows[0] as { hash: string }).hash;
};

test('a job that kills its slot breaks off after three attempts, alone; the rest of the sweep is computed', async () => {
  const numbers = Array.from({ length: 40 }, (_, i) => i);
  const { submissionId } = await submitTestSweep(database.db, theorist, { kernel, numbers });
  const poison = await jobAt(submissionId, 7);
  expect(await workWithPoison(poison)).toBe(3);
  expect(await states(submissionId)).toEqual({ 'broken-off': 1, finished: 39 });
  const { rows } = await database.db.execute(sql`
    select s.state, s.failed_points, s.reserved_ms::int as reserved, s.used_us::int as used, s.lost_us::int as lost,
           e.state as execution, e.failure_text as why, j.state as job,
           (select count(*)::int from execution_events v where v.execution_id = e.id) as events
      from submissions s join executions e on e.submission_id = s.id and e.job_hash = ${poison}
      join jobs j on j.hash = ${poison} where s.id = ${submissionId}`);
  expect(rows).toEqual([
    {
      state: 'done',
      failed_points: 1,
      reserved: 0,
      used: 39 * 100_000,
      lost: 3 * 50_000,
      execution: 'broken-off',
      why: 'the slot ended with code 134',
      job: 'waiting',
      events: 3,
    },
  ]);
  expect(await ledgerErrors(database.db)).toEqual([]);
});

test('the second attempt takes only the first part that was not recorded', async () => {
  await submitTestSweep(database.db, theorist, { kernel, numbers: [1, 2, 3, 4, 5, 6, 7, 8, 9, 10, 11, 12] });
  const chunk = await takeChunk(queue);
  expect(chunk.tasks.length).toBeGreaterThan(2);
  await queue.record(
    chunk,
    chunk.tasks.slice(0, 1).map((task) => recordOf(task)),
  );
  await queue.crash(chunk, 'out of memory', 100_000);
  await endRetryPauses(database.db);
  const again = await takeChunk(queue);
  expect(again).toMatchObject({ id: chunk.id, attempt: 2 });
  expect(again.tasks.map(({ index }) => index)).toEqual([chunk.tasks[1]?.index]);
  expect(again.tasks[0]?.executionId).toBe(chunk.tasks[1]?.executionId);
});

test('after a pause between attempts, and not before', async () => {
  await submitTestSweep(database.db, theorist, { kernel, numbers: [1] });
  await queue.crash(await takeChunk(queue), 'trap', 0);
  expect(await queue.next(anySlot)).toBeNull();
});

test('broken-off points are put back by hand, with a new reservation', async () => {
  const { submissionId } = await submitTestSweep(database.db, theorist, { kernel, numbers: [1, 2, 3, 4] });
  await workWithPoison(await jobAt(submissionId, 2));
  expect(await retryBrokenOff(database.db, theorist, submissionId)).toBe(1);
  expect(await retryBrokenOff(database.db, theorist, submissionId)).toBe(0);
  expect(await findQuota(database.db, theorist.accountId)).toMatchObject({ reservedMs: 100, usedMs: 300 });
  expect(await states(submissionId)).toEqual({ finished: 3, waiting: 1 });
  expect(await drain(queue)).toBe(1);
  expect(await states(submissionId)).toEqual({ finished: 4 });
  expect(await findQuota(database.db, theorist.accountId)).toMatchObject({ reservedMs: 0, usedMs: 400 });
  const { rows } = await database.db.execute(
    sql`select state, failed_points, done_points from submissions where id = ${submissionId}`,
  );
  expect(rows).toEqual([{ state: 'done', failed_points: 0, done_points: 4 }]);
});

test('a dear job resumes at its first part that was not recorded', async () => {
  const { submissionId } = await submitTestSweep(database.db, theorist, {
    kernel,
    numbers: [1],
    job: { estimatedMs: 8000, slices: 8 },
  });
  await workOff(queue, await takeChunk(queue), 2_000_000);
  await queue.crash(await takeChunk(queue), 'trap', 10);
  await endRetryPauses(database.db);
  expect(await drain(queue, 2_000_000)).toBe(4);
  const { rows } = await database.db.execute(sql`
    select state, cpu_us::int as cpu, (select count(*)::int from executions) as executions
      from executions where submission_id = ${submissionId}`);
  expect(rows).toEqual([{ state: 'finished', cpu: 10_000_000, executions: 1 }]);
});
