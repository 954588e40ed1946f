import { cancelSubmission, type Submitter } from '@nightcone/db';
import { createAccount, createTestDatabase, ledgerErrors, type TestDatabase } from '@nightcone/db/testing';
import { pino } from 'pino';
import { afterAll, afterEach, beforeAll, expect, test } from 'vitest';
import { storeFakeKernel, submitFakeSweep } from './testing/fake-sweep.ts';
import { type Watch, watchDatabase } from './testing/until.ts';
import type { FakeParameters } from './threads/testing/fake-kernel.ts';
import { ComputeWorker } from './worker.ts';

let database: TestDatabase;
let theorist: Submitter;
let watch: Watch;
let worker: ComputeWorker;

beforeAll(async () => {
  database = await createTestDatabase();
  theorist = await createAccount(database.db);
  await storeFakeKernel(database.db);
  watch = watchDatabase(database.url);
});
afterEach(() => worker.stop());
afterAll(async () => {
  await watch.stop();
  await database.drop();
});

async function startWorker(slots = 2): Promise<void> {
  worker = new ComputeWorker({
    databaseUrl: database.url,
    slots,
    log: pino({ level: 'silent' }),
    threadEntry: new URL('./threads/testing/fake-slice-thread.ts', import.meta.url),
  });
  await worker.start();
}

const submit = (jobs: FakeParameters[], estimatedMs?: number) =>
  submitFakeSweep(database.db, theorist, jobs, estimatedMs);

async function rows<Row>(query: string, ...values: unknown[]): Promise<Row[]> {
  return (await database.pool.query(query, values)).rows;
}

const ended = (submission: string) =>
  watch.until('the submission has ended', async () => {
    const [row] = await rows<{ state: string }>(
      'select state from submissions where id = $1 and finished_at is not null',
      submission,
    );
    return row?.state ?? null;
  });

const outcomes = (submission: string) =>
  rows<{ outcome: string; count: number }>(
    'select outcome, count(*)::int as count from submission_points where submission_id = $1 group by 1 order by 1',
    submission,
  );

test('a sweep is computed from submission to its last result, each part once', async () => {
  const submission = await submit(Array.from({ length: 30 }, () => ({ slices: 2, acts: ['work-20-ms'] })));
  await startWorker();
  expect(await ended(submission)).toBe('done');
  expect(await outcomes(submission)).toEqual([{ outcome: 'finished', count: 30 }]);
  const [left] = await rows(
    `select (select count(*)::int from leases) as leases, (select sum(running)::int from turns) as running,
            (select count(*)::int from parts where submission_id = $1 and cpu_us >= 0) as parts,
            (select used_us > 0 and reserved_ms = 0 from submissions where id = $1) as settled`,
    submission,
  );
  expect(left).toEqual({ leases: 0, running: 0, parts: 30, settled: true });
  expect(await ledgerErrors(database.db)).toEqual([]);
});

test('a large job is computed in parts by several slots and assembled once', async () => {
  // 10 s of estimate: five parts and an assembly.
  const submission = await submit([{ slices: 12 }], 10_000);
  await startWorker();
  expect(await ended(submission)).toBe('done');
  const parts = await rows<{ outcome: string; count: number }>(
    'select outcome, count(*)::int as count from parts where submission_id = $1 group by 1 order by 1',
    submission,
  );
  expect(parts).toEqual([
    { outcome: 'payloads', count: 5 },
    { outcome: 'result', count: 1 },
  ]);
  // The first byte of each payload is the number of its slice: all there, in order.
  const [{ data }] = (await rows(
    `select r.data from submission_points p join jobs j on j.hash = p.job_hash join results x on x.digest = j.result_digest
       join result_array_rows r on r.sha256 = x.arrays -> 0 ->> 'sha256' where p.submission_id = $1`,
    submission,
  )) as [{ data: Buffer }];
  expect([...data].filter((_, i) => i % 3 === 0)).toEqual(Array.from({ length: 12 }, (_, i) => i));
});

test('a refusal of the kernel is the answer to its job: recorded once, never tried again', async () => {
  const submission = await submit([{ slices: 1 }, { slices: 1, acts: ['refuse'] }, { slices: 1 }]);
  await startWorker();
  expect(await ended(submission)).toBe('done');
  expect(await outcomes(submission)).toEqual([
    { outcome: 'failed', count: 1 },
    { outcome: 'finished', count: 2 },
  ]);
  const executions = await rows(
    `select state, failure_code, failure_text from executions where submission_id = $1 and state <> 'finished'`,
    submission,
  );
  expect(executions).toEqual([
    { state: 'failed', failure_code: 'not-converged', failure_text: 'slice 0 did not converge' },
  ]);
});

test('cancel reaches a slice that never ends within two seconds, and what was finished stays', async () => {
  await startWorker();
  const submission = await submit([
    { slices: 1, acts: ['work-20-ms'] },
    { slices: 1, acts: ['spin'] },
    { slices: 1, acts: ['spin'] },
  ]);
  await watch.until('the first result is recorded and both slots spin', async () => {
    const [row] = await rows<{ ready: boolean }>(
      `select (select count(*) from parts where submission_id = $1) = 1
          and (select count(*) from executions where submission_id = $1 and state = 'running') = 2 as ready`,
      submission,
    );
    return row?.ready ?? false;
  });
  const cancelledAt = performance.now();
  expect(await cancelSubmission(database.db, theorist, submission)).toBe(true);
  expect(await ended(submission)).toBe('cancelled');
  expect(performance.now() - cancelledAt).toBeLessThan(2000);
  expect(await rows('select state from executions where submission_id = $1 order by point', submission)).toEqual(
    ['finished', 'cancelled', 'cancelled'].map((state) => ({ state })),
  );
  expect(await ledgerErrors(database.db)).toEqual([]);
});

test('a stopping worker gives back what it has not finished, and the attempt does not count', async () => {
  const submission = await submit([{ slices: 1, acts: ['spin'] }, { slices: 1 }]);
  await startWorker(1);
  await watch.until('the slot spins', async () => {
    const leases = await rows('select from leases where submission_id = $1', submission);
    return leases.length === 1;
  });
  await worker.stop();
  const [left] = await rows(
    `select s.state, s.open_chunks, (select count(*)::int from leases) as leases, (select count(*)::int from pgboss.job where name = 'chunk' and state < 'completed') as tickets,
            (select state from workers order by started_at desc limit 1) as worker,
            (select count(*)::int from execution_events) as events
       from submissions s where id = $1 and not isempty(todo)`,
    submission,
  );
  expect(left).toEqual({ state: 'active', open_chunks: 0, leases: 0, tickets: 0, worker: 'stopped', events: 0 });
  await cancelSubmission(database.db, theorist, submission);
});

test('a job whose thread dies every time is broken off after three attempts, and the others are finished', async () => {
  const submission = await submit([
    ...Array.from({ length: 5 }, (): FakeParameters => ({ slices: 1 })),
    { slices: 1, acts: ['exit'] },
    ...Array.from({ length: 5 }, (): FakeParameters => ({ slices: 1 })),
  ]);
  await startWorker();
  expect(await ended(submission)).toBe('done');
  expect(await outcomes(submission)).toEqual([
    { outcome: 'broken-off', count: 1 },
    { outcome: 'finished', count: 10 },
  ]);
  const [job] = await rows(
    `select j.state, e.failure_text, (select count(*)::int from execution_events v where v.execution_id = e.id) as attempts
       from executions e join jobs j on j.hash = e.job_hash where e.submission_id = $1 and e.state = 'broken-off'`,
    submission,
  );
  expect(job).toEqual({ state: 'waiting', failure_text: 'the thread ended with code 7', attempts: 3 });
}, 60_000);
