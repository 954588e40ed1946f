import type { JobState } from '@nightcone/contracts';
import { and, count, eq, type SQL, sql } from 'drizzle-orm';
import type { Queryable } from '../../client.ts';
import { jobs } from '../../schema/jobs/jobs.ts';
import { results } from '../../schema/jobs/results.ts';
import { isListed, isMine } from './visible-jobs.ts';

export type JobSort = 'createdAt' | 'finishedAt' | 'cpuMs' | 'model';

export interface JobListing {
  viewer: string;
  sort: JobSort;
  direction: 'ascending' | 'descending';
  model?: string;
  state?: JobState;
  /** True: one's own; false: those of others; undefined: all. */
  mine?: boolean;
  /** In the hash, the model, or the title under which the viewer submitted it. */
  text?: string;
  limit: number;
  /** Sort key and hash of the last row before. */
  after?: [string | number | null, string];
}

export const jobSummaryColumns = (viewer: string) => ({
  hash: jobs.hash,
  model: jobs.model,
  specification: jobs.specification,
  state: jobs.state,
  kernelDigest: jobs.kernelDigest,
  resultDigest: jobs.resultDigest,
  checkFailed: sql<boolean>`coalesce(${results.checkFailed}, false)`,
  cpuMs: jobs.cpuMs,
  firstSubmittedBy: jobs.firstSubmittedBy,
  mine: isMine(viewer),
  createdAt: jobs.createdAt,
  finishedAt: jobs.finishedAt,
});
export type JobSummaryRow = Awaited<ReturnType<typeof listJobs>>['rows'][number];

/** Keys as callers know them: instants to the millisecond, nothing as the least. */
const keys: Record<JobSort, SQL> = {
  createdAt: sql`date_trunc('milliseconds', ${jobs.createdAt})`,
  finishedAt: sql`date_trunc('milliseconds', coalesce(${jobs.finishedAt}, 'epoch'))`,
  cpuMs: sql`coalesce(${jobs.cpuMs}, 0)`,
  model: sql`${jobs.model}`,
};
const casts: Record<JobSort, SQL> = {
  createdAt: sql`::timestamptz`,
  finishedAt: sql`::timestamptz`,
  cpuMs: sql`::float8`,
  model: sql`::text`,
};

/** The text may hold % and _: they are letters here. */
const contains = (text: string) => `%${text.replace(/[\\%_]/g, '\\$&')}%`;

export async function listJobs(db: Queryable, listing: JobListing) {
  const { viewer, sort, direction, model, state, mine, text, limit, after } = listing;
  const wanted = and(
    isListed(viewer),
    model === undefined ? undefined : eq(jobs.model, model),
    state === undefined ? undefined : eq(jobs.state, state),
    mine === undefined ? undefined : mine ? isMine(viewer) : sql`not ${isMine(viewer)}`,
    text === undefined
      ? undefined
      : sql`(${jobs.hash} like ${`${text.toLowerCase().replace(/[\\%_]/g, '\\$&')}%`} or ${jobs.model} ilike ${contains(text)}
          or exists (select from submission_points sp join submissions s on s.id = sp.submission_id
            where sp.job_hash = ${jobs.hash} and s.account_id = ${viewer} and s.title ilike ${contains(text)}))`,
  );
  const key = keys[sort];
  const up = direction === 'ascending';
  const beyond = after && sql`(${key}, ${jobs.hash}) ${up ? sql`>` : sql`<`} (${after[0]}${casts[sort]}, ${after[1]})`;
  const order = up ? sql`${key} asc, ${jobs.hash} asc` : sql`${key} desc, ${jobs.hash} desc`;
  const [rows, [total]] = await Promise.all([
    db
      .select(jobSummaryColumns(viewer))
      .from(jobs)
      .leftJoin(results, eq(results.digest, jobs.resultDigest))
      .where(and(wanted, beyond))
      .orderBy(order)
      .limit(limit),
    db.select({ rows: count() }).from(jobs).where(wanted),
  ]);
  return { rows, total: total?.rows ?? 0 };
}
