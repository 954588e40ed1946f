// What the queue costs: node --import tsx scripts/bench-queue.ts [--repeats 3]. Prints one JSON object.
// Two elapsed times of the same jobs: by the same threads without a queue (pure), and through a worker process on a
// durable database of its own (sweep). Other programs on the machine add to both; they hardly change `idlePercent`, the
// time that the worker's slots spent on other things than jobs, in percent of the time that they spent on jobs.
import { spawn } from 'node:child_process';
import { createInterface } from 'node:readline';
import { parseArgs } from 'node:util';
import { planJobs, submitPlanned } from '../apps/worker/src/testing/planned-sweep.ts';
import { watchDatabase } from '../apps/worker/src/testing/until.ts';
import { ThreadPool } from '../apps/worker/src/threads/thread-pool.ts';
import { createDb, createPool, migrate, type PlannedJob, storeKernel } from '../packages/db/src/index.ts';
import { type LoadedKernel, loadCurrentKernel } from '../packages/kernel/src/node.ts';
import { createDatabase, dropDatabase, startPostgres, stopPostgres } from './postgres.mjs';

const slots = 2;
const { values: options } = parseArgs({ options: { repeats: { type: 'string', default: '3' } } });
const repeats = Number(options.repeats);

/** Elapsed milliseconds of the jobs on two warm threads that take the next one when they are free. */
async function pureMs(kernel: LoadedKernel, jobs: PlannedJob[]): Promise<number> {
  const pool = new ThreadPool({ size: slots });
  const queue = [...jobs];
  const task = (job: PlannedJob, id: number) => ({
    id,
    kind: 'whole' as const,
    job: {
      hash: job.hash,
      kernel: kernel.digest,
      module: kernel.module,
      specification: job.canonicalText,
      tables: new Map(),
    },
  });
  const compute = (thread: (typeof pool.threads)[number], job: PlannedJob) =>
    thread.run([task(job, 0)], { outcomes: () => {} });
  await Promise.all(pool.threads.map((thread) => compute(thread, jobs[0] as PlannedJob)));
  const start = performance.now();
  await Promise.all(
    pool.threads.map(async (thread) => {
      for (let job = queue.shift(); job; job = queue.shift()) await compute(thread, job);
    }),
  );
  const elapsed = performance.now() - start;
  await pool.close();
  return elapsed;
}

interface SweepTimes {
  /** From the submission to its end, with a worker that has joined before. */
  elapsedMs: number;
  idlePercent: number;
}

async function runSweep(server: string, kernel: LoadedKernel, jobs: PlannedJob[]): Promise<SweepTimes> {
  const name = `bench_${process.pid}_${Date.now()}`;
  const url = createDatabase(server, name);
  await migrate(url);
  const pool = createPool(url);
  const db = createDb(pool);
  const { digest, bytes, manifest } = kernel;
  await storeKernel(db, { digest, version: manifest.version, bytes, manifest, current: true });
  const { rows } = await pool.query<{ id: string }>(
    "insert into accounts (provider_id, login, name, state) values ('bench', 'bench', 'bench', 'active') returning id",
  );
  const watch = watchDatabase(url);
  const worker = spawn(process.execPath, ['--import', 'tsx', 'apps/worker/src/main.ts', '--slots', String(slots)], {
    env: { ...process.env, NIGHTCONE_DATABASE_URL: url, NIGHTCONE_LOG_LEVEL: 'debug' },
    stdio: ['ignore', 'pipe', 'inherit'],
  });
  let computeMs = 0;
  createInterface({ input: worker.stdout }).on('line', (line) => {
    const { msg, computeMs: more } = JSON.parse(line);
    if (msg === 'chunk ended') computeMs += more;
  });
  const exited = new Promise((resolve) => worker.once('exit', resolve));
  try {
    await watch.until('the worker has joined', async () => (await pool.query('select from workers')).rowCount === 1);
    const submission = await submitPlanned(db, { accountId: rows[0]?.id as string, requestId: null }, jobs);
    const [elapsedMs, failed] = await watch.until(
      'the sweep has ended',
      async () => {
        const ended = await pool.query<{ ms: number; failed: number }>(
          `select extract(epoch from finished_at - created_at)::float8 * 1000 as ms, failed_points as failed
             from submissions where id = $1 and finished_at is not null`,
          [submission],
        );
        return ended.rows[0] ? ([ended.rows[0].ms, ended.rows[0].failed] as const) : null;
      },
      600_000,
    );
    if (failed) throw new Error(`${failed} jobs failed`);
    worker.kill('SIGTERM');
    await exited;
    return { elapsedMs, idlePercent: 100 * ((slots * elapsedMs) / computeMs - 1) };
  } finally {
    worker.kill('SIGTERM');
    await exited;
    await watch.stop();
    await pool.end();
    dropDatabase(server, name);
  }
}

const kernel = await loadCurrentKernel();
const numbers = (from: number, count: number, step = 1) => Array.from({ length: count }, (_, i) => [from + i * step]);
const sixty = await planJobs(
  kernel,
  {
    model: 'continuum-ribbon',
    parameters: {
      edge: { kind: 'armchair' },
      width: { kind: 'dimer-lines', count: 10 },
      kPerNm: { kind: 'range', start: -1, stop: 1, count: 201 },
      spectrum: { kind: 'nearest', energyEv: 0, count: 8 },
    },
  },
  [{ pointers: ['/width/count'], values: numbers(10, 60) }],
);
const tiny = await planJobs(
  kernel,
  {
    model: 'landau-levels',
    parameters: { fieldT: 1, levels: 5, carrierPerNm2: 0, energyEv: 0, broadening: { kind: 'none' } },
  },
  [{ pointers: ['/fieldT'], values: numbers(1, 2000, 1 / 128) }],
);

const server = await startPostgres('bench');
try {
  const pure: number[] = [];
  const sweeps: SweepTimes[] = [];
  const tinySweeps: SweepTimes[] = [];
  for (let i = 0; i < repeats; i++) {
    pure.push(await pureMs(kernel, sixty));
    sweeps.push(await runSweep(server, kernel, sixty));
    tinySweeps.push(await runSweep(server, kernel, tiny));
  }
  const elapsed = (runs: SweepTimes[]) => runs.map((run) => Math.round(run.elapsedMs));
  const idle = (runs: SweepTimes[]) => runs.map((run) => Math.round(10 * run.idlePercent) / 10);
  const report = {
    slots,
    sixtyJobs: { pureMs: pure.map(Math.round), sweepMs: elapsed(sweeps), idlePercent: idle(sweeps) },
    tinyJobs: {
      sweepMs: elapsed(tinySweeps),
      jobsPerSecond: elapsed(tinySweeps).map((ms) => Math.round((1000 * tiny.length) / ms)),
    },
  };
  console.log(JSON.stringify(report, null, 2));
} finally {
  stopPostgres('bench');
}
