import { sql } from 'drizzle-orm';
import { afterAll, beforeAll, expect, test } from 'vitest';
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
  workOff,
} from '../../../testing/index.ts';
import type { Queue } from '../../queue.ts';
import type { Submitter } from './save-submission.ts';

let database: TestDatabase;
let kernel: string;
let queue: Queue;
let theorist: Submitter;

beforeAll(async () => {
  database = await createTestDatabase();
  kernel = await createKernel(database.db);
  theorist = await createAccount(database.db);
  queue = await startQueue(database.url);
});
afterAll(async () => {
  await queue.stop();
  await database.drop();
});

const rowOf = async (id: string) => {
  const { rows } = await database.db.execute(sql`select * from submissions where id = ${id}`);
  return rows[0] as Record<string, unknown>;
};

test('a sweep of cheap jobs runs from submission to its end, each part once', async () => {
  const { submissionId, jobs } = await submitTestSweep(database.db, theorist, {
    kernel,
    numbers: Array.from({ length: 60 }, (_, i) => i),
  });
  expect(jobs).toBe(60);
  expect(await rowOf(submissionId)).toMatchObject({ state: 'active', todo: '{[0,60)}', reserved_ms: '6000' });
  expect(await drain(queue)).toBe(60);
  expect(await rowOf(submissionId)).toMatchObject({
    state: 'done',
    done_points: 60,
    failed_points: 0,
    open_chunks: 0,
    reserved_ms: '0',
    used_us: '6000000',
  });
  const { rows } = await database.db.execute(sql`
    select (select count(*)::int from parts where submission_id = ${submissionId}) as parts,
           (select count(*)::int from executions where submission_id = ${submissionId} and state = 'finished') as executions,
           (select count(*)::int from jobs where state = 'finished') as jobs,
           (select count(*)::int from leases) as leases,
           (select count(*)::int from pgboss.job where name = 'chunk') as tickets,
           (select sum(running)::int from turns) as running`);
  expect(rows[0]).toEqual({ parts: 60, executions: 60, jobs: 60, leases: 0, tickets: 0, running: 0 });
  expect(await ledgerErrors(database.db)).toEqual([]);
});

test('a dear job runs as parts, then its assembly gets their payloads in slice order', async () => {
  const { submissionId } = await submitTestSweep(database.db, theorist, {
    kernel,
    numbers: [1000],
    job: { estimatedMs: 7_000, slices: 10 },
  });
  expect(await rowOf(submissionId)).toMatchObject({ parts_per_job: 4, todo: '{[0,4)}' });
  const seen: string[] = [];
  for (let chunk = await queue.next(anySlot); chunk; chunk = await queue.next(anySlot)) {
    for (const task of chunk.tasks) {
      seen.push(`${task.kind} ${task.sliceFrom}-${task.sliceTo}`);
      if (task.kind === 'assembly') {
        const payloads = await queue.payloads(chunk, task);
        expect(payloads.map((bytes) => Buffer.from(bytes).toString())).toEqual(
          Array.from({ length: 10 }, (_, i) => `slice ${i}`),
        );
      }
    }
    await workOff(queue, chunk, 1_750_000);
  }
  expect(seen).toEqual(['part 0-2', 'part 2-5', 'part 5-7', 'part 7-10', 'assembly 10-10']);
  expect(await rowOf(submissionId)).toMatchObject({ state: 'done', done_points: 1, done_slices: '10' });
  const { rows } = await database.db.execute(
    sql`select (select count(*)::int from part_rows) as payloads, cpu_us::int as cpu from executions where submission_id = ${submissionId}`,
  );
  expect(rows).toEqual([{ payloads: 0, cpu: 5 * 1_750_000 }]);
});

test('what was recorded stays, the rest of a chunk that yields goes back and no execution of it remains', async () => {
  const { submissionId } = await submitTestSweep(database.db, theorist, {
    kernel,
    numbers: [2000, 2001, 2002, 2003, 2004, 2005, 2006, 2007],
  });
  const chunk = await queue.next(anySlot);
  if (!chunk) throw new Error('nothing to do');
  expect(chunk.tasks.length).toBeGreaterThan(1);
  expect(
    await queue.record(
      chunk,
      chunk.tasks.slice(0, 1).map((task) => recordOf(task)),
    ),
  ).toBe('go');
  await queue.finish(chunk);
  const { rows } = await database.db.execute(
    sql`select state, count(*)::int as n from point_states where submission_id = ${submissionId} group by state order by state`,
  );
  expect(rows).toEqual([
    { state: 'finished', n: 1 },
    { state: 'waiting', n: 7 },
  ]);
  const { rows: jobs } = await database.db.execute(sql`select count(*)::int as n from jobs where state = 'running'`);
  expect(jobs).toEqual([{ n: 0 }]);
  expect(await drain(queue)).toBe(7);
  expect(await rowOf(submissionId)).toMatchObject({ state: 'done', done_points: 8 });
});

test('a deterministic failure is recorded, never tried again, and known to the next who asks', async () => {
  const { submissionId } = await submitTestSweep(database.db, theorist, { kernel, numbers: [3000] });
  const chunk = await queue.next(anySlot);
  if (!chunk) throw new Error('nothing to do');
  await queue.record(chunk, [
    { index: 0, cpuUs: 5_000, outcome: 'failure', code: 'not-converged', text: 'no level found' },
  ]);
  await queue.finish(chunk);
  expect(await rowOf(submissionId)).toMatchObject({ state: 'done', done_points: 1, failed_points: 1 });
  expect(await queue.next(anySlot)).toBeNull();
  const again = await submitTestSweep(database.db, theorist, { kernel, numbers: [3000] });
  expect(again.alreadyComputed).toBe(1);
  expect(await rowOf(again.submissionId)).toMatchObject({ state: 'done', failed_points: 1, reserved_ms: '0' });
});
