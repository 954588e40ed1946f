import { createDb, createPool, migrate } from '@nightcone/db';
import { createAccount, ledgerErrors, type TestDatabase } from '@nightcone/db/testing';
import { afterAll, beforeAll, expect, test } from 'vitest';
import { storeFakeKernel, submitFakeSweep } from '../../apps/worker/src/testing/fake-sweep.ts';
import { type Watch, watchDatabase } from '../../apps/worker/src/testing/until.ts';
import type { FakeParameters } from '../../apps/worker/src/threads/testing/fake-kernel.ts';
import { createDatabase, dropDatabase, restartPostgres, startPostgres, stopPostgres } from '../../scripts/postgres.mjs';
import { nothing, ObservedSweep } from './observed-sweep.ts';
import { WorkerProcess } from './worker-process.ts';

/** A server of this test's own, since the other tests need theirs to stay. */
const purpose = 'faults';
let server: string;
let database: TestDatabase;
let watch: Watch;
let workers: WorkerProcess[];

beforeAll(async () => {
  server = await startPostgres(purpose);
  const name = `faults_${process.pid}_${Date.now()}`;
  const url = createDatabase(server, name);
  await migrate(url);
  const pool = createPool(url);
  database = {
    url,
    pool,
    db: createDb(pool),
    drop: async () => {
      await pool.end();
      dropDatabase(server, name);
    },
  };
  await storeFakeKernel(database.db);
  watch = watchDatabase(url);
  workers = [await WorkerProcess.start(url, { fake: true }), await WorkerProcess.start(url, { fake: true })];
}, 120_000);

afterAll(async () => {
  await Promise.all(workers.map((worker) => worker.end()));
  await watch.stop();
  await database.drop();
  stopPostgres(purpose);
});

test.each(['fast', 'immediate'] as const)(
  'a sweep survives a restart of PostgreSQL (%s) under load',
  async (mode) => {
    const points = 200;
    const jobs = Array.from({ length: points }, (): FakeParameters => ({ slices: 1, acts: ['work-20-ms'] }));
    const submission = await submitFakeSweep(database.db, await createAccount(database.db), jobs, 20);
    const sweep = new ObservedSweep(database, watch, submission);
    await sweep.underWay(10);
    restartPostgres(purpose, mode);
    expect(await sweep.ended()).toBe('done');
    const parts = await sweep.parts();
    expect(parts).toHaveLength(points);
    expect(parts.filter(({ outcome }) => outcome !== 'result')).toEqual([]);
    expect(await sweep.leftOver()).toEqual(nothing);
    expect(await ledgerErrors(database.db)).toEqual([]);
    // No process died of a lost connection.
    expect(workers.map((worker) => worker.isAlive)).toEqual([true, true]);
  },
  90_000,
);
