import { type Candidate, expressMs, nextTurn } from '@nightcone/contracts';
import { sql } from 'drizzle-orm';
import fc from 'fast-check';
import { afterEach, beforeEach, expect, test } from 'vitest';
import {
  anySlot,
  createAccount,
  createKernel,
  createTestDatabase,
  startQueue,
  submitTestSweep,
  type TestDatabase,
  takeChunk,
  workOff,
} from '../../../testing/index.ts';
import type { Queue } from '../../queue.ts';

let database: TestDatabase;
let kernel: string;
let queue: Queue;

beforeEach(async () => {
  database = await createTestDatabase();
  kernel = await createKernel(database.db);
  queue = await startQueue(database.url);
});
afterEach(async () => {
  await queue.stop();
  await database.drop();
});

const range = (from: number, count: number) => Array.from({ length: count }, (_, i) => from + i);
/** Whose chunks are started, one after the other, each computed at once. */
async function turns(count: number): Promise<string[]> {
  const order: string[] = [];
  for (let i = 0; i < count; i++) {
    const chunk = await takeChunk(queue);
    order.push(chunk.submissionId);
    await workOff(queue, chunk, (2_000_000 / chunk.tasks.length) | 0);
  }
  return order;
}
const share = (order: string[], id: string) => order.filter((each) => each === id).length;
const dear = { estimatedMs: 2000 };

test('two people with much work take turns, whoever came first and however much they have', async () => {
  const [a, b] = [await createAccount(database.db), await createAccount(database.db)];
  const big = await submitTestSweep(database.db, a, { kernel, numbers: range(0, 100), job: dear });
  await turns(6);
  const small = await submitTestSweep(database.db, b, { kernel, numbers: range(1000, 10), job: dear });
  const order = await turns(12);
  expect(share(order.slice(0, 2), small.submissionId)).toBe(1);
  expect(share(order, big.submissionId)).toBe(6);
});

test('weight 3 gets three times the work', async () => {
  const [a, b] = [await createAccount(database.db), await createAccount(database.db)];
  const light = await submitTestSweep(database.db, a, { kernel, numbers: range(0, 50), job: dear });
  const heavy = await submitTestSweep(database.db, b, { kernel, numbers: range(1000, 50), job: dear });
  await database.db.execute(sql`update turns set weight = 3 where account_id = ${b.accountId}`);
  const order = await turns(20);
  expect([share(order, light.submissionId), share(order, heavy.submissionId)]).toEqual([5, 15]);
});

test('one person’s submissions of equal priority take turns; a higher priority goes first', async () => {
  const person = await createAccount(database.db);
  const one = await submitTestSweep(database.db, person, { kernel, numbers: range(0, 20), job: dear });
  const two = await submitTestSweep(database.db, person, { kernel, numbers: range(100, 20), job: dear });
  const order = await turns(8);
  expect([share(order, one.submissionId), share(order, two.submissionId)]).toEqual([4, 4]);
  await database.db.execute(sql`update submissions set priority = 1 where id = ${two.submissionId}`);
  expect(share(await turns(4), two.submissionId)).toBe(4);
});

test('a person holds no more slots than the cap', async () => {
  const person = await createAccount(database.db);
  await submitTestSweep(database.db, person, { kernel, numbers: range(0, 20), job: dear });
  await database.db.execute(sql`update turns set max_slots = 2`);
  const first = await takeChunk(queue);
  await takeChunk(queue);
  expect(await queue.next(anySlot)).toBeNull();
  await workOff(queue, first);
  expect(await queue.next(anySlot)).not.toBeNull();
});

test('a slot takes only what fits its memory, an express slot only what is short', async () => {
  const person = await createAccount(database.db);
  await submitTestSweep(database.db, person, {
    kernel,
    numbers: [1],
    job: { estimatedMs: expressMs + 1, memoryBytes: 3e9 },
  });
  expect(await queue.next({ express: false, memoryBytes: 2e9 })).toBeNull();
  expect(await queue.next({ express: true, memoryBytes: 4e9 })).toBeNull();
  expect(await queue.next({ express: false, memoryBytes: 4e9 })).not.toBeNull();
});

test('a worker that winds down, or is outside its own hours, gets nothing', async () => {
  const person = await createAccount(database.db);
  await submitTestSweep(database.db, person, { kernel, numbers: [1] });
  await database.db.execute(sql`update workers set state = 'winding-down'`);
  expect(await queue.next(anySlot)).toBeNull();
  await database.db.execute(
    sql`update workers set state = 'active', works_from = (now() at time zone 'UTC')::time + interval '1 hour', works_to = (now() at time zone 'UTC')::time + interval '2 hours'`,
  );
  expect(await queue.next(anySlot)).toBeNull();
  await database.db.execute(sql`update workers set works_from = null, works_to = null`);
  expect(await queue.next(anySlot)).not.toBeNull();
});

test('the window goes by the clock on the wall, through both changes of summer time', async () => {
  await database.db.execute(
    sql`insert into settings (group_name, time_zone, night_from, night_to) values ('g', 'Europe/Berlin', '20:00', '07:00')`,
  );
  // [UTC, open]: 2026-03-29 02:00 → 03:00 and 2026-10-25 03:00 → 02:00 local time
  const moments: [string, boolean][] = [
    ['2026-03-28T18:59:00Z', false],
    ['2026-03-28T19:00:00Z', true],
    ['2026-03-29T04:59:00Z', true],
    ['2026-03-29T05:00:00Z', false],
    ['2026-10-24T17:59:00Z', false],
    ['2026-10-24T18:00:00Z', true],
    ['2026-10-25T05:59:00Z', true],
    ['2026-10-25T06:00:00Z', false],
  ];
  for (const [moment, open] of moments) {
    const { rows } = await database.db.execute(sql`select queue.is_night(${moment}::timestamptz) as open`);
    expect({ moment, open: rows[0]?.open }).toEqual({ moment, open });
  }
});

test('work for tonight waits for the window, and a retry that comes after it gives its part back', async () => {
  const person = await createAccount(database.db);
  const window = (from: string, to: string) =>
    database.db.execute(
      sql`insert into settings (group_name, night_from, night_to) values ('g', (now() at time zone 'UTC')::time + ${from}::interval, (now() at time zone 'UTC')::time + ${to}::interval)`,
    );
  const { submissionId } = await submitTestSweep(database.db, person, { kernel, numbers: [1], tonight: true });
  await window('1 hour', '2 hours');
  expect(await queue.next(anySlot)).toBeNull();
  await window('-1 hour', '1 hour');
  const chunk = await takeChunk(queue);
  await queue.crash(chunk, 'trap', 0);
  await window('1 hour', '2 hours');
  await database.db.execute(sql`update pgboss.job set start_after = now() - interval '1 s'`);
  expect(await queue.next(anySlot)).toBeNull();
  const { rows } = await database.db.execute(
    sql`select todo::text, open_chunks, state from submissions where id = ${submissionId}`,
  );
  expect(rows).toEqual([{ todo: '{[0,1)}', open_chunks: 0, state: 'active' }]);
});

test('the database chooses as the pure rule does', async () => {
  const people = await Promise.all(range(0, 3).map(() => createAccount(database.db)));
  const submitted: { id: string; accountId: string }[] = [];
  for (const [i, person] of [...people, ...people].entries()) {
    const sweep = await submitTestSweep(database.db, person, { kernel, numbers: [i] });
    submitted.push({ id: sweep.submissionId, accountId: person.accountId });
  }
  await database.db.execute(
    sql`insert into settings (group_name, night_from, night_to) values ('g', '20:00', '07:00')`,
  );
  const small = fc.integer({ min: 0, max: 3 });
  const submission = fc.record({
    tonight: fc.boolean(),
    priority: fc.integer({ min: 0, max: 1 }),
    age: small,
    partMs: fc.constantFrom(10, expressMs, expressMs + 1),
    memoryBytes: fc.constantFrom(1, 2, 3),
    virtualTime: small,
    waiting: fc.boolean(),
  });
  const person = fc.record({
    virtualTime: small,
    clock: small,
    running: small,
    maxSlots: fc.constantFrom(2, 9),
    quotaLeft: fc.boolean(),
  });
  const slot = fc.record({
    express: fc.boolean(),
    memoryBytes: fc.constantFrom(1, 2, 3),
    night: fc.boolean(),
    clock: small,
  });
  await fc.assert(
    fc.asyncProperty(
      fc.tuple(...submitted.map(() => submission)),
      fc.tuple(person, person, person),
      slot,
      async (all, persons, free) => {
        const candidates: Candidate[] = [];
        for (const [i, { id, accountId }] of submitted.entries()) {
          const row = all[i] as (typeof all)[number];
          const at = people.findIndex((each) => each.accountId === accountId);
          const owner = persons[at] as (typeof persons)[number];
          const createdAt = 1_700_000_000_000 + row.age * 1000;
          await database.db.execute(sql`
          update submissions set tonight = ${row.tonight}, priority = ${row.priority}, part_ms = ${row.partMs}, memory_bytes = ${row.memoryBytes},
                 virtual_time = ${row.virtualTime}, state = ${row.waiting ? 'active' : 'paused'}, created_at = ${new Date(createdAt).toISOString()} where id = ${id}`);
          if (row.waiting) {
            candidates.push({
              ...row,
              submissionId: id,
              accountId,
              createdAt,
              quotaLeft: owner.quotaLeft,
              person: owner,
            });
          }
        }
        for (const [i, owner] of persons.entries()) {
          const { accountId } = people[i] as (typeof people)[number];
          await database.db.execute(sql`update turns set virtual_time = ${owner.virtualTime}, clock = ${owner.clock}, running = ${owner.running},
            max_slots = ${owner.maxSlots} where account_id = ${accountId}`);
          await database.db.execute(
            sql`update quota_balances set used_ms = ${owner.quotaLeft ? 0 : 1e12} where account_id = ${accountId}`,
          );
        }
        await database.db.execute(sql`update turn_clock set virtual_time = ${free.clock}`);
        const moment = free.night ? '2026-01-10T23:00:00Z' : '2026-01-10T12:00:00Z';
        const { rows } = await database.db.execute(
          sql`select submission_id as id from queue.next_turn(${free.express}, ${free.memoryBytes}, ${moment}::timestamptz)`,
        );
        expect(rows[0]?.id).toBe(nextTurn(candidates, free)?.submissionId);
      },
    ),
    { numRuns: 60 },
  );
});
