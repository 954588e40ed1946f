import { sql } from 'drizzle-orm';
import { afterEach, beforeEach, expect, test } from 'vitest';
import {
  ageLeases,
  createAccount,
  createKernel,
  createTestDatabase,
  drain,
  endRetryPauses,
  ledgerErrors,
  reapNow,
  recordOf,
  resultOf,
  startQueue,
  submitTestSweep,
  type TestDatabase,
  takeChunk,
  workOff,
} from '../../../testing/index.ts';
import { leaseMs, type Queue } from '../../queue.ts';
import { reapLeases } from './close-chunk.ts';
import type { Submitter } from './save-submission.ts';

let database: TestDatabase;
let kernel: string;
let theorist: Submitter;
let first: Queue;
let second: Queue;

beforeEach(async () => {
  database = await createTestDatabase();
  kernel = await createKernel(database.db);
  theorist = await createAccount(database.db);
  first = await startQueue(database.url);
  second = await startQueue(database.url);
});
afterEach(async () => {
  await Promise.all([first.stop(), second.stop()]);
  await database.drop();
});

const tables = ['parts', 'part_rows', 'results', 'result_arrays', 'result_array_rows', 'quota_entries'];
const counts = async () => {
  const all = await Promise.all(
    tables.map((table) => database.db.execute(sql`select count(*)::int as n from ${sql.identifier(table)}`)),
  );
  return all.map(({ rows }) => rows[0]?.n);
};
test('a worker that has lost its lease writes nothing, and is told so', async () => {
  await submitTestSweep(database.db, theorist, { kernel, numbers: [1, 2, 3, 4, 5, 6, 7, 8] });
  const stale = await takeChunk(first);
  await ageLeases(database.db);
  expect(await reapNow(second)).toBe(1);
  await endRetryPauses(database.db);
  const retried = await takeChunk(second);
  expect(retried).toMatchObject({ id: stale.id, attempt: 2 });

  const before = await counts();
  expect(
    await first.record(
      stale,
      stale.tasks.map((task) => recordOf(task)),
    ),
  ).toBe('lost');
  expect([...(await first.beat([{ chunk: stale, cpuUs: 1, fraction: 0.5 }])).values()]).toEqual(['lost']);
  await first.finish(stale);
  expect(await counts()).toEqual(before);

  expect([...(await second.beat([{ chunk: retried, cpuUs: 1, fraction: 0.5 }])).values()]).toEqual(['go']);
  await workOff(second, retried);
  expect(await drain(second)).toBe(7);
  expect(await ledgerErrors(database.db)).toEqual([]);
});

test('payloads of a stale worker are not stored either', async () => {
  await submitTestSweep(database.db, theorist, { kernel, numbers: [1], job: { estimatedMs: 8000, slices: 8 } });
  const stale = await takeChunk(first);
  await ageLeases(database.db);
  await reapNow(second);
  expect(
    await first.record(
      stale,
      stale.tasks.map((task) => recordOf(task)),
    ),
  ).toBe('lost');
  expect(await counts()).toEqual([0, 0, 0, 0, 0, expect.any(Number)]);
});

test('a record that is repeated, because its answer was lost, counts once', async () => {
  const { submissionId } = await submitTestSweep(database.db, theorist, { kernel, numbers: [1, 2, 3, 4] });
  const chunk = await takeChunk(first);
  const records = chunk.tasks.map((task) => recordOf(task));
  expect(await first.record(chunk, records)).toBe('go');
  const before = await counts();
  expect(await first.record(chunk, records)).toBe('go');
  expect(await counts()).toEqual(before);
  await first.finish(chunk);
  await first.finish(chunk);
  const { rows } = await database.db.execute(
    sql`select used_us::int as used, open_chunks from submissions where id = ${submissionId}`,
  );
  expect(rows).toEqual([{ used: chunk.tasks.length * 100_000, open_chunks: 0 }]);
});

test('a part that is not in the chunk is not recorded', async () => {
  await submitTestSweep(database.db, theorist, { kernel, numbers: [1, 2, 3, 4, 5, 6, 7, 8] });
  const chunk = await takeChunk(first);
  await first.record(chunk, [{ index: 7, cpuUs: 1, outcome: 'result', result: resultOf('x') }]);
  const { rows } = await database.db.execute(sql`select count(*)::int as n from parts`);
  expect(rows).toEqual([{ n: 0 }]);
});

test('nobody is reaped before the database has been in reach for one lease time, nor while writing', async () => {
  await submitTestSweep(database.db, theorist, { kernel, numbers: [1] });
  const chunk = await takeChunk(first);
  await ageLeases(database.db);
  expect(await second.reap()).toBe(0);
  const writer = await database.pool.connect();
  try {
    await writer.query('begin');
    await writer.query('select from leases for no key update');
    const reaper = await database.pool.connect();
    expect(await reapLeases(reaper, leaseMs)).toEqual([]);
    reaper.release();
    // the heartbeat of a process does not wait for the chunk that is being written
    expect([...(await first.beat([{ chunk, cpuUs: 1, fraction: 0 }])).values()]).toEqual(['go']);
  } finally {
    await writer.query('rollback');
    writer.release();
  }
});

test('a silent worker is marked, and active again when it speaks', async () => {
  const stateOf = async (queue: Queue) =>
    (await database.db.execute(sql`select state from workers where id = ${queue.worker.id}`)).rows[0]?.state;
  await database.db.execute(
    sql`update workers set heartbeat_at = now() - interval '1 hour' where id = ${first.worker.id}`,
  );
  await reapNow(second);
  expect(await stateOf(first)).toBe('silent');
  await first.beat([]);
  expect(await stateOf(first)).toBe('active');
});
