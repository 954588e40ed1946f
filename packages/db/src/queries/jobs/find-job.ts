import { and, asc, desc, eq, getTableColumns, inArray, sql } from 'drizzle-orm';
import type { Queryable } from '../../client.ts';
import { executionEvents, executions } from '../../schema/jobs/executions.ts';
import { jobs } from '../../schema/jobs/jobs.ts';
import { results } from '../../schema/jobs/results.ts';
import { submissionPoints, submissions } from '../../schema/queue/submissions.ts';
import { sweeps } from '../../schema/sweeps.ts';
import { jobSummaryColumns } from './list-jobs.ts';
import { mayOpen } from './visible-jobs.ts';

/** A job with its result, as far as this person may open it. */
export async function findOptionalJob(db: Queryable, hash: string, viewer: string) {
  const [row] = await db
    .select({
      ...jobSummaryColumns(viewer),
      canonicalText: jobs.canonicalText,
      tableDigests: jobs.tableDigests,
      estimatedMs: jobs.estimatedMs,
      slices: jobs.slices,
      resultBytes: jobs.resultBytes,
      memoryBytes: jobs.memoryBytes,
      failureCode: jobs.failureCode,
      failureText: jobs.failureText,
      arrays: results.arrays,
      certificate: results.certificate,
    })
    .from(jobs)
    .leftJoin(results, eq(results.digest, jobs.resultDigest))
    .where(and(eq(jobs.hash, hash), mayOpen(viewer)));
  return row;
}

/** The viewer's own sweeps that hold this job. */
export async function listSweepsOfJob(db: Queryable, hash: string, viewer: string) {
  return db
    .selectDistinct({ id: sweeps.id, title: sweeps.title, createdAt: sweeps.createdAt })
    .from(sweeps)
    .innerJoin(submissionPoints, eq(submissionPoints.submissionId, sweeps.submissionId))
    .where(and(eq(submissionPoints.jobHash, hash), eq(sweeps.ownerId, viewer)))
    .orderBy(desc(sweeps.createdAt))
    .limit(50);
}

/** Part numbers of the execution's point, the slices of which are recorded; and those held by a live lease. */
const point = sql`queue.parts_of(array[${executions.point}], ${submissions.partsPerJob})`;
const doneSlices = sql<number>`coalesce((select sum(queue.slices_of(p.index, ${submissions.partsPerJob}, ${jobs.slices}))
  from parts p where p.submission_id = ${executions.submissionId} and p.execution_id = ${executions.id}), 0)`;
const openSlices = sql<number>`coalesce((select sum(queue.slices_of(i, ${submissions.partsPerJob}, ${jobs.slices}))
  from chunks c join leases l on l.chunk_id = c.id, queue.numbers(c.parts * ${point}) i
  where c.submission_id = ${executions.submissionId} and c.state = 'open'
    and not exists (select from parts p where p.submission_id = c.submission_id and p.index = i)), 0)`;

const executionColumns = {
  ...getTableColumns(executions),
  slices: jobs.slices,
  firstDigest: jobs.resultDigest,
  doneSlices: doneSlices.mapWith(Number),
  openSlices: openSlices.mapWith(Number),
  queueState: submissions.state,
};

const selectExecutions = (db: Queryable) =>
  db
    .select(executionColumns)
    .from(executions)
    .innerJoin(jobs, eq(jobs.hash, executions.jobHash))
    .innerJoin(submissions, eq(submissions.id, executions.submissionId));
export type ExecutionRow = Awaited<ReturnType<typeof selectExecutions>>[number];

export async function listExecutionsOfJob(db: Queryable, hash: string): Promise<ExecutionRow[]> {
  return selectExecutions(db)
    .where(eq(executions.jobHash, hash))
    .orderBy(asc(executions.createdAt), asc(executions.id))
    .limit(200);
}

export async function findOptionalExecution(
  db: Queryable,
  id: string,
  viewer: string,
): Promise<ExecutionRow | undefined> {
  const [row] = await selectExecutions(db).where(and(eq(executions.id, id), mayOpen(viewer)));
  return row;
}

export async function listExecutionEvents(db: Queryable, ids: readonly string[]) {
  return ids.length === 0
    ? []
    : db
        .select()
        .from(executionEvents)
        .where(inArray(executionEvents.executionId, [...ids]))
        .orderBy(asc(executionEvents.id));
}

/** Of these hashes, those whose job has ended: finished, disputed or failed for good. */
export async function listEndedJobs(db: Queryable, hashes: readonly string[]): Promise<string[]> {
  const rows = await db
    .select({ hash: jobs.hash })
    .from(jobs)
    .where(
      and(
        sql`${jobs.hash} = any(${sql.param([...hashes])}::text[])`,
        inArray(jobs.state, ['finished', 'disputed', 'failed']),
      ),
    );
  return rows.map(({ hash }) => hash);
}
