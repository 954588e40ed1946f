import { type PointState, submissionStates } from '@nightcone/contracts';
import { sql } from 'drizzle-orm';
import {
  bigint,
  boolean,
  check,
  doublePrecision,
  index,
  integer,
  jsonb,
  pgTable,
  pgView,
  primaryKey,
  smallint,
  text,
  uuid,
} from 'drizzle-orm/pg-core';
import { accounts } from '../accounts.ts';
import { instant, multirange, oneOf } from '../columns.ts';
import { jobs } from '../jobs/jobs.ts';
import { quotaBalances } from '../quotas.ts';

export const submissionKinds = ['sweep', 'job', 're-run'] as const;
export const pointOutcomes = ['finished', 'failed', 'reused', 'broken-off', 'left-out', 'cancelled'] as const;

/**
 * What someone asked for; the unit the queue works on. Its parts are numbered: with one part per job the index is the
 * point; with G parts it is point * (G + 1) + part, where part G assembles the result of the other parts.
 */
export const submissions = pgTable(
  'submissions',
  {
    id: uuid().primaryKey().defaultRandom(),
    kind: text({ enum: submissionKinds }).notNull(),
    accountId: uuid()
      .notNull()
      .references(() => accounts.id),
    balanceId: uuid()
      .notNull()
      .references(() => quotaBalances.id),
    title: text().notNull(),
    model: text().notNull(),
    state: text({ enum: submissionStates }).notNull().default('active'),
    tonight: boolean().notNull(),
    priority: smallint().notNull().default(0),
    points: integer().notNull(),
    partsPerJob: integer().notNull(),
    /** The backlog: parts that are neither in an open chunk nor recorded nor held. */
    todo: multirange().notNull(),
    /** Parts that wait behind a pilot. */
    held: multirange().notNull().default('{}'),
    openChunks: integer().notNull().default(0),
    parkedPoints: integer().notNull().default(0),
    donePoints: integer().notNull().default(0),
    failedPoints: integer().notNull().default(0),
    /** Slices to do at submission, and those recorded or dropped since: the reservation shrinks in step. */
    totalSlices: bigint({ mode: 'number' }).notNull(),
    doneSlices: bigint({ mode: 'number' }).notNull().default(0),
    /** Reference CPU: the estimate of everything, and per part as learned from the chunks done so far. */
    estimatedMs: doublePrecision().notNull(),
    partMs: doublePrecision().notNull(),
    memoryBytes: bigint({ mode: 'number' }).notNull(),
    reservedAtStartMs: bigint({ mode: 'number' }).notNull(),
    reservedMs: bigint({ mode: 'number' }).notNull(),
    usedUs: bigint({ mode: 'number' }).notNull().default(0),
    /** CPU of attempts that broke off; nobody pays for it. */
    lostUs: bigint({ mode: 'number' }).notNull().default(0),
    virtualTime: doublePrecision().notNull().default(0),
    createdAt: instant().notNull().defaultNow(),
    startedAt: instant(),
    finishedAt: instant(),
  },
  (table) => [
    index('submissions_backlog').on(table.accountId).where(sql.raw(`state = 'active' and not isempty(todo)`)),
    index('submissions_account').on(table.accountId, table.createdAt),
    index('submissions_open').on(table.state).where(sql.raw(`state in ('active', 'paused')`)),
    check('submissions_kind', oneOf('kind', submissionKinds)),
    check('submissions_state', oneOf('state', submissionStates)),
    check('submissions_numbering', sql.raw('points > 0 and parts_per_job > 0')),
    check(
      'submissions_counts',
      sql.raw('open_chunks >= 0 and parked_points >= 0 and done_points <= points and failed_points <= points'),
    ),
    check('submissions_reserved', sql.raw('reserved_ms >= 0 and reserved_ms <= reserved_at_start_ms and used_us >= 0')),
    check(
      'submissions_done_is_empty',
      sql.raw(`state <> 'done' or (isempty(todo) and isempty(held) and open_chunks = 0 and parked_points = 0)`),
    ),
    check('submissions_end_releases', sql.raw('finished_at is null or reserved_ms = 0')),
  ],
);

/** Point (place in the computing order) → job. A sweep has many; a single job or a re-run has one. */
export const submissionPoints = pgTable(
  'submission_points',
  {
    submissionId: uuid()
      .notNull()
      .references(() => submissions.id, { onDelete: 'cascade' }),
    point: integer().notNull(),
    jobHash: text()
      .notNull()
      .references(() => jobs.hash),
    /** Place in the grid: row-major over the axes, last axis fastest. */
    place: integer().notNull(),
    /** The swept values at this place, one per pointer. */
    sweptValues: jsonb().$type<unknown[]>().notNull().default([]),
    /** How it ended; null while it is held, waiting, parked or running. */
    outcome: text({ enum: pointOutcomes }),
  },
  (table) => [
    primaryKey({ columns: [table.submissionId, table.point] }),
    index('submission_points_job').on(table.jobHash),
    check('submission_points_outcome', oneOf('outcome', pointOutcomes)),
  ],
);

/** Points that wait because another submission is computing their job at this moment. */
export const parkedPoints = pgTable(
  'parked_points',
  {
    submissionId: uuid()
      .notNull()
      .references(() => submissions.id, { onDelete: 'cascade' }),
    point: integer().notNull(),
    jobHash: text().notNull(),
    /** The parts that go back to the backlog when the other one ends without a result. */
    parts: multirange().notNull(),
  },
  (table) => [primaryKey({ columns: [table.submissionId, table.point] }), index('parked_points_job').on(table.jobHash)],
);

/** How each point of a submission stands, in one word. */
export const pointStates = pgView('point_states', {
  submissionId: uuid().notNull(),
  point: integer().notNull(),
  place: integer().notNull(),
  jobHash: text().notNull(),
  sweptValues: jsonb().$type<unknown[]>().notNull(),
  state: text().$type<PointState>().notNull(),
}).existing();
