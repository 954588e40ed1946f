import { createAccount, createTestDatabase, ledgerErrors, type TestDatabase } from '@nightcone/db/testing';
import { afterEach, beforeEach, expect, test } from 'vitest';
import { storeFakeKernel, submitFakeSweep } from '../../apps/worker/src/testing/fake-sweep.ts';
import { type Watch, watchDatabase } from '../../apps/worker/src/testing/until.ts';
import type { FakeParameters } from '../../apps/worker/src/threads/testing/fake-kernel.ts';
import { nothing, ObservedSweep } from './observed-sweep.ts';
import { WorkerProcess } from './worker-process.ts';

let database: TestDatabase;
let watch: Watch;
let workers: WorkerProcess[];

beforeEach(async () => {
  database = await createTestDatabase();
  watch = watchDatabase(database.url);
  workers = [];
  await storeFakeKernel(database.db);
});
afterEach(async () => {
  await Promise.all(workers.map((worker) => worker.end()));
  await watch.stop();
  await database.drop();
});

async function startWorker(): Promise<WorkerProcess> {
  const worker = await WorkerProcess.start(database.url, { fake: true });
  workers.push(worker);
  return worker;
}

const points = 100;
/** 100 jobs of 40 ms: four seconds of work for one process. */
async function submit(): Promise<ObservedSweep> {
  const jobs = Array.from(
    { length: points },
    (): FakeParameters => ({ slices: 2, acts: ['work-20-ms', 'work-20-ms'] }),
  );
  const submission = await submitFakeSweep(database.db, await createAccount(database.db), jobs, 40);
  return new ObservedSweep(database, watch, submission);
}

test('kill -9 in the middle of a sweep: it is finished after a restart, and only parts in flight are computed again', async () => {
  const sweep = await submit();
  const first = await startWorker();
  const before = await sweep.underWay(10);
  first.signal('SIGKILL');
  await first.exited;
  const second = await startWorker();
  expect(await sweep.ended()).toBe('done');

  const parts = await sweep.parts();
  expect(parts).toHaveLength(points);
  // Whatever the first process had recorded stays as it was; records on their way at the kill may have come after `before`.
  const ofFirst = parts.filter(({ worker }) => worker === first.id);
  expect(ofFirst).toEqual(expect.arrayContaining(before));
  // The second process carried out exactly what was not recorded.
  await watch.until('its last chunk is logged', async () => second.tasksEnded >= points - ofFirst.length);
  expect(second.tasksEnded).toBe(points - ofFirst.length);
  expect(await sweep.leftOver()).toEqual(nothing);
  expect(await ledgerErrors(database.db)).toEqual([]);
}, 90_000);

test('a worker that was stopped for longer than its lease is fenced, drops its chunks and goes on', async () => {
  const sweep = await submit();
  const zombie = await startWorker();
  await sweep.underWay(10);
  zombie.signal('SIGSTOP');
  const other = await startWorker();
  await other.logged('took the leases of a silent worker');
  zombie.signal('SIGCONT');
  await zombie.logged('chunk was lost to another attempt');
  expect(await sweep.ended()).toBe('done');

  expect(await sweep.parts()).toHaveLength(points);
  expect(await sweep.leftOver()).toEqual(nothing);
  expect(await ledgerErrors(database.db)).toEqual([]);
  // It takes part again: the next sweep is its own, since the other one is gone.
  other.signal('SIGTERM');
  expect(await other.exited).toEqual({ code: 0, signal: null });
  const next = await submit();
  expect(await next.ended()).toBe('done');
  expect(new Set((await next.parts()).map(({ worker }) => worker))).toEqual(new Set([zombie.id]));
}, 90_000);

test('SIGTERM in the middle of a sweep: the process ends by itself, and no attempt is spent', async () => {
  const sweep = await submit();
  const first = await startWorker();
  await sweep.underWay(10);
  first.signal('SIGTERM');
  expect(await first.exited).toEqual({ code: 0, signal: null });
  await startWorker();
  expect(await sweep.ended()).toBe('done');
  expect((await sweep.parts()).filter(({ attempt }) => attempt > 1)).toEqual([]);
  expect(await sweep.leftOver()).toEqual(nothing);
}, 60_000);
