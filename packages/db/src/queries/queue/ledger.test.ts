import { sql } from 'drizzle-orm';
import fc from 'fast-check';
import { afterEach, beforeEach, expect, test } from 'vitest';
import {
  ageLeases,
  anySlot,
  createAccount,
  createKernel,
  createTestDatabase,
  drain,
  endRetryPauses,
  ledgerErrors,
  reapNow,
  recordOf,
  startQueue,
  submitTestSweep,
  type TestDatabase,
} from '../../../testing/index.ts';
import type { Chunk, Queue } from '../../queue.ts';
import { adjustQuota } from '../quotas/adjust-quota.ts';
import { findQuota, listQuotaEntries } from '../quotas/find-quota.ts';
import { cancelSubmission, pauseSubmission, resumeSubmission, retryBrokenOff } from './control-submission.ts';

let database: TestDatabase;
let kernel: string;
let queue: Queue;

beforeEach(async () => {
  database = await createTestDatabase();
  kernel = await createKernel(database.db);
  queue = await startQueue(database.url, { speedFactor: 1.37 });
});
afterEach(async () => {
  await queue.stop();
  await database.drop();
});

type Step =
  | 'submit'
  | 'submit dear'
  | 'next'
  | 'record'
  | 'finish'
  | 'crash'
  | 'lose'
  | 'pause'
  | 'resume'
  | 'cancel'
  | 'retry';
const steps: readonly Step[] = [
  'submit',
  'submit dear',
  'next',
  'next',
  'next',
  'record',
  'record',
  'record',
  'finish',
  'finish',
  'crash',
  'lose',
  'pause',
  'resume',
  'cancel',
  'retry',
];

test('whatever happens, balances are the sum of their entries and nothing is computed twice or lost', async () => {
  const actor = await createAccount(database.db);
  const other = await createAccount(database.db);
  let fresh = 0;
  await fc.assert(
    fc.asyncProperty(
      fc.array(fc.tuple(fc.constantFrom(...steps), fc.nat(20)), { minLength: 10, maxLength: 40 }),
      async (script) => {
        const open: Chunk[] = [];
        const submissions: string[] = [];
        const pick = <T>(list: T[], n: number): T | undefined => list[n % Math.max(1, list.length)];
        for (const [step, n] of script) {
          const chunk = pick(open, n);
          const submission = pick(submissions, n);
          if (step.startsWith('submit')) {
            const job = step === 'submit' ? { estimatedMs: 300 } : { estimatedMs: 7000, slices: 5 };
            const { submissionId } = await submitTestSweep(database.db, n % 2 ? actor : other, {
              kernel,
              numbers: [fresh++, fresh++, fresh++],
              job,
            });
            submissions.push(submissionId);
          } else if (step === 'next') {
            await endRetryPauses(database.db);
            const taken = await queue.next(anySlot);
            if (taken) open.push(taken);
          } else if (chunk && step === 'record') {
            const part = chunk.tasks[n % chunk.tasks.length] as Chunk['tasks'][number];
            await queue.record(chunk, [recordOf(part, 123_457 + n)]);
          } else if (chunk && (step === 'finish' || step === 'crash')) {
            if (step === 'finish') await queue.finish(chunk);
            else await queue.crash(chunk, 'trap', 1000);
            open.splice(open.indexOf(chunk), 1);
          } else if (chunk && step === 'lose') {
            await ageLeases(database.db);
            await reapNow(queue);
          } else if (submission && step === 'pause') await pauseSubmission(database.db, actor, submission);
          else if (submission && step === 'resume') await resumeSubmission(database.db, actor, submission);
          else if (submission && step === 'cancel') await cancelSubmission(database.db, actor, submission);
          else if (submission && step === 'retry') await retryBrokenOff(database.db, actor, submission);
          expect(await ledgerErrors(database.db)).toEqual([]);
        }
        for (const chunk of open) await queue.finish(chunk);
        for (const id of submissions) await resumeSubmission(database.db, actor, id);
        for (;;) {
          await endRetryPauses(database.db);
          const chunk = await queue.next(anySlot);
          if (!chunk) break;
          await queue.record(
            chunk,
            chunk.tasks.map((task) => recordOf(task, 99_999)),
          );
          await queue.finish(chunk);
        }
        expect(await ledgerErrors(database.db)).toEqual([]);
        const { rows } = await database.db.execute(sql`
        select (select count(*)::int from submissions where finished_at is null) as unfinished,
               (select count(*)::int from leases) as leases, (select count(*)::int from chunks where state = 'open') as chunks,
               (select coalesce(sum(running), 0)::int from turns) as running, (select coalesce(sum(reserved_ms), 0)::int from quota_balances) as reserved,
               (select count(*)::int from jobs where state = 'running') as "jobsRunning", (select count(*)::int from executions where state = 'running') as "executionsRunning",
               (select count(*)::int from point_states where state not in ('finished', 'broken-off', 'cancelled')) as "openPoints",
               (select count(*)::int from pgboss.job where name = 'chunk') as tickets, (select count(*)::int from part_rows) as payloads,
               (select count(*)::int from submissions s where s.state = 'done' and s.done_slices <> s.total_slices) as "slicesLeft",
               (select count(*)::int from submissions s where s.done_points <> (select count(*) from submission_points p where p.submission_id = s.id and p.outcome is not null)) as miscounted`);
        expect(rows).toEqual([
          {
            unfinished: 0,
            leases: 0,
            chunks: 0,
            running: 0,
            reserved: 0,
            jobsRunning: 0,
            executionsRunning: 0,
            openPoints: 0,
            tickets: 0,
            payloads: 0,
            slicesLeft: 0,
            miscounted: 0,
          },
        ]);
      },
    ),
    { numRuns: 15 },
  );
}, 120_000);

test('reference CPU is charged in whole milliseconds without losing fractions', async () => {
  const actor = await createAccount(database.db);
  await submitTestSweep(database.db, actor, { kernel, numbers: Array.from({ length: 30 }, (_, i) => i) });
  for (let chunk = await queue.next(anySlot); chunk; chunk = await queue.next(anySlot)) {
    for (const task of chunk.tasks) await queue.record(chunk, [recordOf(task, 333)]);
    await queue.finish(chunk);
  }
  // 30 × round(333 µs × 1.37) = 13 680 µs
  expect(await findQuota(database.db, actor.accountId)).toMatchObject({ usedMs: 13, reservedMs: 0 });
});

test('a new week brings the grant, less what the week before was overrun by; what was left lapses', async () => {
  const actor = await createAccount(database.db);
  const { id, grantedMs, weekStart, weekEnd } = await findQuota(database.db, actor.accountId);
  expect(weekEnd.getTime() - weekStart.getTime()).toBe(7 * 86_400_000);
  expect(weekStart.getUTCDay()).toBe(1);
  const balanceAfter = async (days: number) => {
    const { rows } = await database.db.execute<{ id: string }>(
      sql`select queue.balance_of(${actor.accountId}, ${weekEnd.toISOString()}::timestamptz + make_interval(days => ${days})) as id`,
    );
    const entries = await listQuotaEntries(database.db, (rows[0] as { id: string }).id);
    return entries.reduce((sum, entry) => sum + entry.grantedMs, 0);
  };
  expect(await balanceAfter(0)).toBe(grantedMs);
  await database.db.execute(sql`select queue.post(id, 'settle', 0, 0, granted_ms + 5000, 'test', ${id}) from quota_balances
    where account_id = ${actor.accountId} and week_start = ${weekEnd.toISOString()}`);
  expect(await balanceAfter(7)).toBe(grantedMs - 5000);
  expect(await balanceAfter(14)).toBe(grantedMs);
});

test('work that its week cannot pay any more goes on in the present week, with the rest of its reservation', async () => {
  const actor = await createAccount(database.db);
  const { submissionId } = await submitTestSweep(database.db, actor, { kernel, numbers: [1, 2, 3, 4] });
  const { id: old, grantedMs } = await findQuota(database.db, actor.accountId);
  await adjustQuota(database.db, actor, { accountId: actor.accountId, ms: -grantedMs, reason: 'nothing is left' });
  expect(await queue.next(anySlot)).toBeNull();
  await database.db.execute(
    sql`update quota_balances set week_start = week_start - interval '7 days', week_end = week_end - interval '7 days'`,
  );
  expect(await drain(queue, 100_000)).toBe(4);
  const sides = async (id: string) =>
    (await listQuotaEntries(database.db, id))
      .map(({ kind, reservedMs, usedMs }) => [kind, reservedMs, usedMs])
      .reverse();
  expect((await sides(old)).slice(1)).toEqual([
    ['reserve', 400, 0],
    ['adjust', 0, 0],
    ['release', -400, 0],
  ]);
  const present = await findQuota(database.db, actor.accountId);
  expect(present).toMatchObject({ grantedMs, reservedMs: 0, usedMs: 548 });
  expect((await sides(present.id)).slice(0, 2)).toEqual([
    ['grant', 0, 0],
    ['reserve', 400, 0],
  ]);
  const { rows } = await database.db.execute(sql`select state from submissions where id = ${submissionId}`);
  expect(rows).toEqual([{ state: 'done' }]);
});

test('the ledger, the audit log and the settings are append-only', async () => {
  await createAccount(database.db);
  for (const table of ['quota_entries', 'audit_entries', 'settings']) {
    const name = sql.identifier(table);
    const column = sql.identifier(
      table === 'settings' ? 'group_name' : table === 'audit_entries' ? 'action' : 'reason',
    );
    for (const statement of [
      sql`update ${name} set ${column} = 'x'`,
      sql`delete from ${name}`,
      sql`truncate ${name}`,
    ]) {
      await expect(database.db.execute(statement)).rejects.toMatchObject({ cause: { code: '23001' } });
    }
  }
});
