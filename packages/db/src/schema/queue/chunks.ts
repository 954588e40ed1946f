import { sql } from 'drizzle-orm';
import {
  bigint,
  check,
  doublePrecision,
  index,
  integer,
  pgTable,
  primaryKey,
  real,
  text,
  uuid,
} from 'drizzle-orm/pg-core';
import { bytea, instant, multirange, oneOf } from '../columns.ts';
import { submissions } from './submissions.ts';

export const chunkStates = ['open', 'done', 'cancelled', 'dead'] as const;
export const partOutcomes = ['payloads', 'result', 'failure'] as const;

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
