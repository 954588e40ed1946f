import { type SQL, sql } from 'drizzle-orm';
import { jobs } from '../../schema/jobs/jobs.ts';

/** Jobs that this person has asked for, alone or in a sweep. */
export const isMine = (viewer: string): SQL<boolean> =>
  sql<boolean>`exists (select from submission_points sp join submissions s on s.id = sp.submission_id
    where sp.job_hash = ${jobs.hash} and s.account_id = ${viewer})`;

/** A hash is an address, not a secret; but a job that uses tables is only for who holds every one of them. */
export const mayOpen = (viewer: string): SQL =>
  sql`(${jobs.tableDigests} = '{}' or not exists (select from unnest(${jobs.tableDigests}) needed where not exists (
    select from table_holdings h where h.table_digest = needed and h.account_id = ${viewer})))`;

/** In lists and searches, unlisted jobs show only to those who asked for them. */
export const isListed = (viewer: string): SQL =>
  sql`(${mayOpen(viewer)} and (not ${jobs.unlisted} or ${isMine(viewer)}))`;
