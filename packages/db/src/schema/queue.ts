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
  real,
  smallint,
  text,
  uuid,
} from 'drizzle-orm/pg-core';
import { accounts } from './accounts.ts';
import { bytea, instant, multirange, oneOf } from './columns.ts';
import { jobs } from './jobs.ts';
import { quotaBalances } from './quotas.ts';

export const submissionKinds = ['sweep', 'job', 're-run'] as const;
export const chunkStates = ['open', 'done', 'cancelled', 'dead'] as const;
export const pointOutcomes = ['finished', 'failed', 'reused', 'broken-off', 'left-out', 'cancelled'] as const;
export const partOutcomes = ['payloads', 'result', 'failure'] as const;

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

/** The record of a finished part: written once, under the fence of its lease. */
export const parts = pgTable(
  'parts',
  {
    submissionId: uuid()
      .notNull()
      .references(() => submissions.id, { onDelete: 'cascade' }),
    index: integer().notNull(),
    executionId: uuid().notNull(),
    outcome: text({ enum: partOutcomes }).notNull(),
    attempt: integer().notNull(),
    worker: text().notNull(),
    /** Measured CPU, and the factor that turns it into reference CPU. */
    cpuUs: bigint({ mode: 'number' }).notNull(),
    speedFactor: doublePrecision().notNull(),
    at: instant().notNull().defaultNow(),
  },
  (table) => [
    primaryKey({ columns: [table.submissionId, table.index] }),
    index('parts_execution').on(table.executionId),
    check('parts_outcome', oneOf('outcome', partOutcomes)),
    check('parts_cpu', sql.raw('cpu_us >= 0 and speed_factor > 0')),
  ],
);

/** Payloads of slices in rows of at most 4 MiB, kept until their job is assembled. */
export const partRows = pgTable(
  'part_rows',
  {
    submissionId: uuid()
      .notNull()
      .references(() => submissions.id, { onDelete: 'cascade' }),
    index: integer().notNull(),
    slice: integer().notNull(),
    number: integer().notNull(),
    data: bytea().notNull(),
  },
  (table) => [
    primaryKey({ columns: [table.submissionId, table.index, table.slice, table.number] }),
    check('part_rows_size', sql.raw('octet_length(data) <= 4194304')),
  ],
);

/** Parts handed to one slot at once; the id is also that of its ticket, which counts the attempts. */
export const chunks = pgTable(
  'chunks',
  {
    id: uuid().primaryKey().defaultRandom(),
    submissionId: uuid()
      .notNull()
      .references(() => submissions.id, { onDelete: 'cascade' }),
    accountId: uuid().notNull(),
    parts: multirange().notNull(),
    estimatedMs: doublePrecision().notNull(),
    attempt: integer().notNull().default(0),
    state: text({ enum: chunkStates }).notNull().default('open'),
    createdAt: instant().notNull().defaultNow(),
    closedAt: instant(),
    /** Reference CPU of its recorded parts. */
    usedUs: bigint({ mode: 'number' }).notNull().default(0),
  },
  (table) => [
    index('chunks_open').on(table.submissionId).where(sql.raw(`state = 'open'`)),
    index('chunks_closed').on(table.closedAt),
    check('chunks_state', oneOf('state', chunkStates)),
  ],
);

/** One row per attempt now running; (chunk, attempt) is the fencing token. Lock order: lease, chunk, submission, balance. */
export const leases = pgTable('leases', {
  chunkId: uuid()
    .primaryKey()
    .references(() => chunks.id, { onDelete: 'cascade' }),
  attempt: integer().notNull(),
  submissionId: uuid().notNull(),
  accountId: uuid().notNull(),
  worker: text().notNull(),
  startedAt: instant().notNull().defaultNow(),
  beatAt: instant().notNull().defaultNow(),
  /** Measured CPU so far, and how much of the chunk is done: what the progress shows. */
  cpuUs: bigint({ mode: 'number' }).notNull().default(0),
  fraction: real().notNull().default(0),
});

/** A person's place in the turn order (start-time fair queueing) and the limits that differ from the group's. */
export const turns = pgTable(
  'turns',
  {
    accountId: uuid()
      .primaryKey()
      .references(() => accounts.id, { onDelete: 'cascade' }),
    weight: doublePrecision().notNull().default(1),
    /** Null: the group's setting. */
    maxSlots: integer(),
    weeklyGrantMs: bigint({ mode: 'number' }),
    running: integer().notNull().default(0),
    virtualTime: doublePrecision().notNull().default(0),
    /** Start tag of the submission cut last: the clock among this person's own submissions. */
    clock: doublePrecision().notNull().default(0),
  },
  () => [check('turns_limits', sql.raw('weight > 0 and running >= 0 and (max_slots is null or max_slots >= 0)'))],
);

/** Start tag of the person whose work was cut last: the clock among people. One row. */
export const turnClock = pgTable(
  'turn_clock',
  {
    one: boolean().primaryKey().default(true),
    virtualTime: doublePrecision().notNull().default(0),
  },
  () => [check('turn_clock_one', sql.raw('one'))],
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
