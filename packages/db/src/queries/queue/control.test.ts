import { sql } from 'drizzle-orm';
import { afterEach, beforeEach, expect, test } from 'vitest';
import {
  anySlot,
  createAccount,
  createKernel,
  createTestDatabase,
  drain,
  ledgerErrors,
  recordOf,
  startQueue,
  submitTestSweep,
  type TestDatabase,
  takeChunk,
} from '../../../testing/index.ts';
import type { Queue, QueueMessage } from '../../queue.ts';
import { adjustQuota } from '../quotas/adjust-quota.ts';
import { findQuota } from '../quotas/find-quota.ts';
import { cancelSubmission, pauseSubmission, resumeSubmission } from './control-submission.ts';
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

const numbers = Array.from({ length: 12 }, (_, i) => i);
const rowOf = async (id: string) => {
  const { rows } = await database.db.execute(
    sql`select state, todo::text, open_chunks, done_points, reserved_ms::int as reserved from submissions where id = ${id}`,
  );
  return rows[0];
};
const recordFirst = (chunk: Parameters<Queue['record']>[0]) =>
  queue.record(
    chunk,
    chunk.tasks.slice(0, 1).map((task) => recordOf(task)),
  );

test('a paused submission starts nothing and its slot yields; resumed it goes on to the end', async () => {
  const { submissionId } = await submitTestSweep(database.db, theorist, { kernel, numbers });
  const chunk = await takeChunk(queue);
  expect(await pauseSubmission(database.db, theorist, submissionId)).toBe(true);
  expect(await pauseSubmission(database.db, theorist, submissionId)).toBe(false);
  expect(await recordFirst(chunk)).toBe('yield');
  await queue.finish(chunk);
  expect(await queue.next(anySlot)).toBeNull();
  expect(await rowOf(submissionId)).toMatchObject({ state: 'paused', open_chunks: 0, done_points: 1, reserved: 1100 });
  expect(await resumeSubmission(database.db, theorist, submissionId)).toBe(true);
  expect(await drain(queue)).toBe(11);
  expect(await rowOf(submissionId)).toMatchObject({ state: 'done', done_points: 12, reserved: 0 });
});

test('cancel stops what runs, keeps what is finished, and releases the rest of the reservation', async () => {
  const { submissionId } = await submitTestSweep(database.db, theorist, { kernel, numbers });
  const chunk = await takeChunk(queue);
  await recordFirst(chunk);
  expect(await cancelSubmission(database.db, theorist, submissionId)).toBe(true);
  expect(await rowOf(submissionId)).toMatchObject({ state: 'cancelled', todo: '{}', open_chunks: 1 });
  // what was computed before the order came is still recorded
  expect(
    await queue.record(
      chunk,
      chunk.tasks.slice(1, 2).map((task) => recordOf(task)),
    ),
  ).toBe('cancel');
  await queue.finish(chunk);
  expect(await rowOf(submissionId)).toMatchObject({ state: 'cancelled', open_chunks: 0, done_points: 2, reserved: 0 });
  expect(await cancelSubmission(database.db, theorist, submissionId)).toBe(false);
  const { rows } = await database.db.execute(
    sql`select state, count(*)::int as n from executions group by state order by state`,
  );
  expect(rows).toEqual([
    { state: 'cancelled', n: chunk.tasks.length - 2 },
    { state: 'finished', n: 2 },
  ]);
  expect(await findQuota(database.db, theorist.accountId)).toMatchObject({ reservedMs: 0, usedMs: 200 });
  expect(await ledgerErrors(database.db)).toEqual([]);
});

test('cancel of what has not begun ends it at once', async () => {
  const { submissionId } = await submitTestSweep(database.db, theorist, { kernel, numbers });
  await cancelSubmission(database.db, theorist, submissionId);
  const { rows } = await database.db.execute(
    sql`select s.finished_at is not null as ended, (select count(*)::int from point_states p where p.submission_id = s.id and p.state = 'cancelled') as cancelled
          from submissions s where id = ${submissionId}`,
  );
  expect(rows).toEqual([{ ended: true, cancelled: 12 }]);
});

test('a used-up quota stops the work; more of it starts it again', async () => {
  const { submissionId } = await submitTestSweep(database.db, theorist, { kernel, numbers });
  const { grantedMs } = await findQuota(database.db, theorist.accountId);
  await adjustQuota(database.db, theorist, { accountId: theorist.accountId, ms: 50 - grantedMs, reason: 'less' });
  const chunk = await takeChunk(queue);
  expect(await recordFirst(chunk)).toBe('yield');
  await queue.finish(chunk);
  expect(await queue.next(anySlot)).toBeNull();
  await adjustQuota(database.db, theorist, { accountId: theorist.accountId, ms: 100_000, reason: 'more' });
  expect(await drain(queue)).toBe(11);
  expect(await rowOf(submissionId)).toMatchObject({ state: 'done' });
});

test('who listens is told of work, of changes, of the end of a job, and of orders', async () => {
  const heard: string[] = [];
  let heardCancel = () => {};
  const cancelled = new Promise<void>((resolve) => {
    heardCancel = resolve;
  });
  await new Promise<void>((resolve) =>
    queue.listen(({ topic, id }: QueueMessage) => {
      if (topic === 'connected') resolve();
      heard.push(`${topic} ${id}`);
      if (topic === 'cancel') heardCancel();
    }),
  );
  const { submissionId } = await submitTestSweep(database.db, theorist, { kernel, numbers });
  const chunk = await takeChunk(queue);
  await recordFirst(chunk);
  await cancelSubmission(database.db, theorist, submissionId);
  await cancelled;
  expect(heard).toContain('work ');
  expect(heard).toContain(`submission ${submissionId}`);
  expect(heard).toContain(`job ${chunk.tasks[0]?.jobHash}`);
  expect(heard).toContain(`quota ${theorist.accountId}`);
});
