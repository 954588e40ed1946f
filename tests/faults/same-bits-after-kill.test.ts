import { type PlannedJob, storeKernel } from '@nightcone/db';
import { createAccount, createTestDatabase, ledgerErrors, type TestDatabase } from '@nightcone/db/testing';
import { type LoadedKernel, loadCurrentKernel, openKernel } from '@nightcone/kernel/node';
import { resultDigest } from '@nightcone/provenance';
import { afterEach, beforeEach, expect, test } from 'vitest';
import { planJobs, type Question, submitPlanned } from '../../apps/worker/src/testing/planned-sweep.ts';
import { type Watch, watchDatabase } from '../../apps/worker/src/testing/until.ts';
import { nothing, ObservedSweep } from './observed-sweep.ts';
import { WorkerProcess } from './worker-process.ts';

let database: TestDatabase;
let watch: Watch;
let kernel: LoadedKernel;
let workers: WorkerProcess[];

beforeEach(async () => {
  database = await createTestDatabase();
  watch = watchDatabase(database.url);
  workers = [];
  kernel = await loadCurrentKernel();
  const { digest, bytes, manifest } = kernel;
  await storeKernel(database.db, { digest, version: manifest.version, bytes, manifest, current: true });
});
afterEach(async () => {
  await Promise.all(workers.map((worker) => worker.end()));
  await watch.stop();
  await database.drop();
});

async function startWorker(): Promise<WorkerProcess> {
  const worker = await WorkerProcess.start(database.url, { fake: false });
  workers.push(worker);
  return worker;
}

/** What an undisturbed execution finds, in this process and slice by slice. */
async function undisturbed({ canonicalText }: PlannedJob): Promise<string> {
  const instance = openKernel(kernel.module);
  instance.open(JSON.parse(canonicalText));
  const payloads = Array.from({ length: instance.sliceCount() }, (_, slice) => instance.computeSlice(slice));
  return resultDigest(instance.assemble(payloads));
}

const fans: Question = {
  model: 'landau-levels',
  parameters: {
    fieldT: { kind: 'range', start: 0, stop: 20, count: 41 },
    levels: 10,
    energyEv: { kind: 'range', start: -0.4, stop: 0.4, count: 51 },
  },
};
const velocities = (count: number) => Array.from({ length: count }, (_, i) => [0.5 + i / 256]);

test.each([
  ['cheap jobs in one part each', 60, (job: PlannedJob) => job],
  // The estimate decides into how many parts a job is cut; the bits must not depend on it.
  ['jobs cut into parts that are assembled later', 20, (job: PlannedJob) => ({ ...job, estimatedMs: 8000 })],
])(
  'a sweep whose worker was killed ends with the bits of an undisturbed execution: %s',
  async (_, count, cut) => {
    const jobs = (await planJobs(kernel, fans, [{ pointers: ['/diracVelocityEvNm'], values: velocities(count) }])).map(
      cut,
    );
    const submission = await submitPlanned(database.db, await createAccount(database.db), jobs);
    const sweep = new ObservedSweep(database, watch, submission);
    const first = await startWorker();
    const before = await sweep.underWay(5);
    first.signal('SIGKILL');
    await first.exited;
    const second = await startWorker();
    expect(await sweep.ended()).toBe('done');

    const parts = await sweep.parts();
    expect(parts.filter(({ worker }) => worker === first.id)).toEqual(expect.arrayContaining(before));
    expect(new Set(parts.map(({ worker }) => worker))).toEqual(new Set([first.id, second.id]));
    const { rows } = await database.pool.query<{ hash: string; digest: string }>(
      'select hash, result_digest as digest from jobs',
    );
    const found = new Map(rows.map(({ hash, digest }) => [hash, digest]));
    for (const job of jobs) expect(found.get(job.hash)).toBe(await undisturbed(job));
    expect(await sweep.leftOver()).toEqual(nothing);
    expect(await ledgerErrors(database.db)).toEqual([]);
  },
  120_000,
);
