import { sql } from 'drizzle-orm';
import { afterAll, beforeAll, expect, test } from 'vitest';
import {
  createAccount,
  createKernel,
  createTestDatabase,
  ledgerErrors,
  plannedJob,
  submitTestSweep,
  type TestDatabase,
} from '../../../testing/index.ts';
import { IdempotencyMismatch, QuotaExceeded } from '../../errors.ts';
import { adjustQuota } from '../quotas/adjust-quota.ts';
import { findQuota, listQuotaEntries } from '../quotas/find-quota.ts';
import { submitJob } from './submit-job.ts';
import { submitRerun } from './submit-rerun.ts';

let database: TestDatabase;
let kernel: string;
beforeAll(async () => {
  database = await createTestDatabase();
  kernel = await createKernel(database.db);
});
afterAll(() => database.drop());

const count = async (table: string) => {
  const { rows } = await database.db.execute<{ n: number }>(
    sql`select count(*)::int as n from ${sql.identifier(table)}`,
  );
  return (rows[0] as { n: number }).n;
};
const hash = (digit: string) => digit.repeat(64);

test('another request under the same key is refused', async () => {
  const theorist = await createAccount(database.db);
  const key = { key: 'k', requestHash: hash('a') };
  await submitTestSweep(database.db, theorist, { kernel, numbers: [1], key });
  const other = { key: 'k', requestHash: hash('b') };
  await expect(submitTestSweep(database.db, theorist, { kernel, numbers: [2], key: other })).rejects.toBeInstanceOf(
    IdempotencyMismatch,
  );
});

test('a submission over the quota is refused and leaves nothing behind', async () => {
  const theorist = await createAccount(database.db);
  const { grantedMs } = await findQuota(database.db, theorist.accountId);
  const before = await Promise.all(
    ['jobs', 'submissions', 'submission_points', 'audit_entries', 'quota_entries'].map(count),
  );
  const dear = { kernel, numbers: [10], job: { estimatedMs: grantedMs + 1, slices: 8 } };
  const refusal = await submitTestSweep(database.db, theorist, dear).catch((error: unknown) => error);
  expect(refusal).toBeInstanceOf(QuotaExceeded);
  expect(refusal).toMatchObject({ neededMs: grantedMs + 1, freeMs: grantedMs });
  const after = await Promise.all(
    ['jobs', 'submissions', 'submission_points', 'audit_entries', 'quota_entries'].map(count),
  );
  expect(after).toEqual(before);
});

test('the same key twice, one after the other or at once, is one submission', async () => {
  const theorist = await createAccount(database.db);
  const key = { key: 'same', requestHash: hash('c') };
  const before = await count('submissions');
  const answers = await Promise.all(
    [1, 2, 3].map(() => submitTestSweep(database.db, theorist, { kernel, numbers: [20, 21], key })),
  );
  answers.push(await submitTestSweep(database.db, theorist, { kernel, numbers: [20, 21], key }));
  expect(new Set(answers.map(({ sweepId }) => sweepId)).size).toBe(1);
  expect(await count('submissions')).toBe(before + 1);
});

test('the same key of another person is another key', async () => {
  const key = { key: 'mine', requestHash: hash('d') };
  const [a, b] = [await createAccount(database.db), await createAccount(database.db)];
  const first = await submitTestSweep(database.db, a, { kernel, numbers: [30], key });
  const second = await submitTestSweep(database.db, b, { kernel, numbers: [30], key });
  expect(second.sweepId).not.toBe(first.sweepId);
});

test('50 submissions at once never take more than the quota holds', async () => {
  const theorist = await createAccount(database.db);
  const { grantedMs } = await findQuota(database.db, theorist.accountId);
  await adjustQuota(database.db, theorist, { accountId: theorist.accountId, ms: 1000 - grantedMs, reason: 'test' });
  const outcomes = await Promise.allSettled(
    Array.from({ length: 50 }, (_, i) => submitTestSweep(database.db, theorist, { kernel, numbers: [100 + i] })),
  );
  expect(outcomes.filter(({ status }) => status === 'fulfilled')).toHaveLength(10);
  for (const outcome of outcomes)
    if (outcome.status === 'rejected') expect(outcome.reason).toBeInstanceOf(QuotaExceeded);
  expect(await findQuota(database.db, theorist.accountId)).toMatchObject({ grantedMs: 1000, reservedMs: 1000 });
  expect(await ledgerErrors(database.db)).toEqual([]);
});

test('points get numbers in computing order and keep their place and values', async () => {
  const theorist = await createAccount(database.db);
  const { submissionId } = await submitTestSweep(database.db, theorist, { kernel, numbers: [200, 201, 202, 203, 204] });
  const { rows } = await database.db.execute(
    sql`select place, swept_values as "values" from submission_points where submission_id = ${submissionId} order by point`,
  );
  expect(rows.map(({ place }) => place)).toEqual([0, 4, 2, 1, 3]);
  expect(rows.map(({ values }) => values)).toEqual([[200], [204], [202], [201], [203]]);
});

test('a job keeps the parts it is submitted in: about 2 s each, never more than it has slices', async () => {
  const theorist = await createAccount(database.db);
  const partsOf = async (number: number, job: object) => {
    const { submissionId } = await submitTestSweep(database.db, theorist, { kernel, numbers: [number], job });
    const { rows } = await database.db.execute(
      sql`select parts_per_job as parts, todo::text from submissions where id = ${submissionId}`,
    );
    return rows[0];
  };
  expect(await partsOf(300, { estimatedMs: 2000, slices: 50 })).toEqual({ parts: 1, todo: '{[0,1)}' });
  expect(await partsOf(301, { estimatedMs: 9000, slices: 50 })).toEqual({ parts: 5, todo: '{[0,5)}' });
  expect(await partsOf(302, { estimatedMs: 9000, slices: 3 })).toEqual({ parts: 3, todo: '{[0,3)}' });
});

test('a submission is told in the audit log, with who and in which request', async () => {
  const theorist = { ...(await createAccount(database.db)), requestId: 'request-7' };
  const { submissionId } = await submitJob(database.db, theorist, null, {
    title: 'one',
    tonight: true,
    job: plannedJob(kernel, 400),
  });
  const { rows } = await database.db.execute(
    sql`select action, actor_id, after from audit_entries where request_id = 'request-7'`,
  );
  expect(rows).toEqual([
    {
      action: 'jobs.submit',
      actor_id: theorist.accountId,
      after: { submissionId, alreadyComputed: false, tonight: true },
    },
  ]);
});

test('a re-run of a job that does not exist is nothing; of one that does it has its execution at once', async () => {
  const theorist = await createAccount(database.db);
  expect(await submitRerun(database.db, theorist, null, { jobHash: hash('0'), title: 'x' })).toBeUndefined();
  const job = plannedJob(kernel, 500);
  await submitJob(database.db, theorist, null, { title: 'one', tonight: false, job });
  const rerun = await submitRerun(database.db, theorist, null, { jobHash: job.hash, title: 'again' });
  const { rows } = await database.db.execute(
    sql`select reason, state, started_at from executions where id = ${rerun?.executionId}`,
  );
  expect(rows).toEqual([{ reason: 're-run', state: 'running', started_at: null }]);
});

test('the ledger of a person is a grant and what was reserved', async () => {
  const theorist = await createAccount(database.db);
  await submitTestSweep(database.db, theorist, { kernel, numbers: [600, 601] });
  const { id } = await findQuota(database.db, theorist.accountId);
  const entries = await listQuotaEntries(database.db, id);
  expect(entries.map(({ kind, grantedMs, reservedMs }) => ({ kind, grantedMs, reservedMs }))).toEqual([
    { kind: 'reserve', grantedMs: 0, reservedMs: 200 },
    { kind: 'grant', grantedMs: 360_000_000, reservedMs: 0 },
  ]);
});
