import { and, asc, desc, eq, getTableColumns, inArray, type SQL, sql } from 'drizzle-orm';
import type { Queryable } from '../../client.ts';
import { submissions } from '../../schema/queue/submissions.ts';
import { turns } from '../../schema/queue/turns.ts';
import { quotaBalances } from '../../schema/quotas.ts';
import { sweeps } from '../../schema/sweeps.ts';

/** Parts waiting, in open chunks, and points with a running execution. */
const derived = {
  sweepId: sweeps.id,
  sweepTitle: sweeps.title,
  /** Of a single job or a re-run. */
  jobHash: sql<
    string | null
  >`case when ${submissions.kind} = 'sweep' then null else (select sp.job_hash from submission_points sp
    where sp.submission_id = ${submissions.id} order by sp.point limit 1) end`,
  waitingParts: sql<number>`queue.size(${submissions.todo}) + queue.size(${submissions.held})`.mapWith(Number),
  openParts: sql<number>`(select coalesce(sum(queue.size(c.parts)), 0) from chunks c
    where c.submission_id = ${submissions.id} and c.state = 'open')`.mapWith(Number),
  recordedOpenParts: sql<number>`(select count(*) from chunks c, queue.numbers(c.parts) i join parts p on p.index = i
    where c.submission_id = ${submissions.id} and c.state = 'open' and p.submission_id = c.submission_id)`.mapWith(
    Number,
  ),
  runningPoints: sql<number>`(select count(*) from executions e
    where e.submission_id = ${submissions.id} and e.state = 'running' and e.started_at is not null)`.mapWith(Number),
  leases: sql<number>`(select count(*) from leases l where l.submission_id = ${submissions.id})`.mapWith(Number),
  weight: sql<number>`coalesce(${turns.weight}, 1)`,
  /** Place among the person's own submissions of equal priority; the smallest goes first. */
  ownTag: sql<number>`greatest(${submissions.virtualTime}, coalesce(${turns.clock}, 0))`,
  personSlots: turns.maxSlots,
  personRunning: sql<number>`coalesce(${turns.running}, 0)`.mapWith(Number),
  quotaSpent: sql<boolean>`${quotaBalances.usedMs} >= ${quotaBalances.grantedMs}`,
};

const selectSubmissions = (db: Queryable, where: SQL | undefined) =>
  db
    .select({ ...getTableColumns(submissions), ...derived })
    .from(submissions)
    .innerJoin(quotaBalances, eq(quotaBalances.id, submissions.balanceId))
    .leftJoin(turns, eq(turns.accountId, submissions.accountId))
    .leftJoin(sweeps, eq(sweeps.submissionId, submissions.id))
    .where(where)
    .$dynamic();
export type SubmissionRow = Awaited<ReturnType<typeof selectSubmissions>>[number];

/** Everybody's work that has not ended, in the order of its submission: what the scheduler has before it. */
export async function listOpenSubmissions(db: Queryable): Promise<SubmissionRow[]> {
  return selectSubmissions(db, inArray(submissions.state, ['active', 'paused'])).orderBy(
    asc(submissions.createdAt),
    asc(submissions.id),
  );
}

/** One person's work that has ended, the newest first. */
export async function listEndedSubmissions(db: Queryable, accountId: string, limit: number): Promise<SubmissionRow[]> {
  const ended = and(eq(submissions.accountId, accountId), inArray(submissions.state, ['done', 'cancelled']));
  return selectSubmissions(db, ended).orderBy(desc(submissions.createdAt)).limit(limit);
}

export async function listSubmissionsById(db: Queryable, ids: readonly string[]): Promise<SubmissionRow[]> {
  return ids.length === 0 ? [] : selectSubmissions(db, inArray(submissions.id, [...ids]));
}

export async function findOptionalSubmission(db: Queryable, id: string): Promise<SubmissionRow | undefined> {
  const [row] = await selectSubmissions(db, eq(submissions.id, id));
  return row;
}

/** Whose turn is next: tags of start-time fair queueing, for the sentence that says who comes first. */
export async function listTurnTags(db: Queryable) {
  const { rows } = await db.execute<{ accountId: string; tag: number }>(sql`
    select t.account_id as "accountId", greatest(t.virtual_time, c.virtual_time) as tag from turns t, turn_clock c`);
  return new Map(rows.map(({ accountId, tag }) => [accountId, tag]));
}

/** Whose submission it is, and of which sweep. */
export async function findSubmissionOwner(db: Queryable, id: string) {
  const [row] = await db
    .select({ accountId: submissions.accountId, sweepId: sweeps.id })
    .from(submissions)
    .leftJoin(sweeps, eq(sweeps.submissionId, submissions.id))
    .where(eq(submissions.id, id));
  return row;
}
