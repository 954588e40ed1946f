import { executionStates, jobStates } from '@nightcone/contracts';
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
  text,
  uniqueIndex,
  uuid,
} from 'drizzle-orm/pg-core';
import { accounts } from './accounts.ts';
import { instant, oneOf } from './columns.ts';
import { kernels } from './kernels.ts';
import { submissions } from './queue.ts';
import { results } from './results.ts';

export const executionReasons = ['first', 're-run', 'audit', 'restore'] as const;

/** One computation, by the hash of its inputs: whoever asks the same asks for the same row. */
export const jobs = pgTable(
  'jobs',
  {
    hash: text().primaryKey(),
    canonicalText: text().notNull(),
    specification: jsonb().notNull().generatedAlwaysAs(sql.raw('canonical_text::jsonb')),
    model: text().notNull(),
    kernelDigest: text()
      .notNull()
      .references(() => kernels.digest),
    /** The same physics whatever the kernel: digest of the specification without `kernel`. */
    questionDigest: text(),
    tableDigests: text().array().notNull().default([]),
    unlisted: boolean().notNull().default(false),
    /** Estimate, in milliseconds on the reference machine. */
    estimatedMs: doublePrecision().notNull(),
    slices: integer().notNull(),
    resultBytes: bigint({ mode: 'number' }).notNull(),
    /** Peak memory of one part while it is computed or assembled. */
    memoryBytes: bigint({ mode: 'number' }).notNull(),
    state: text({ enum: jobStates }).notNull().default('waiting'),
    /** Of the first finished execution. */
    resultDigest: text().references(() => results.digest),
    cpuMs: doublePrecision(),
    failureCode: text(),
    failureText: text(),
    firstSubmittedBy: uuid()
      .notNull()
      .references(() => accounts.id),
    createdAt: instant().notNull().defaultNow(),
    finishedAt: instant(),
  },
  (table) => [
    index('jobs_created').on(table.createdAt, table.hash),
    index('jobs_finished').on(table.finishedAt),
    index('jobs_result').on(table.resultDigest),
    index('jobs_question').on(table.questionDigest),
    check('jobs_hash', sql.raw(`hash = encode(sha256(convert_to(canonical_text, 'UTF8')), 'hex')`)),
    check('jobs_state', oneOf('state', jobStates)),
    check('jobs_slices', sql.raw('slices > 0 and estimated_ms >= 0 and result_bytes >= 0 and memory_bytes >= 0')),
    check('jobs_result_when_finished', sql.raw(`(state in ('finished', 'disputed')) = (result_digest is not null)`)),
    check('jobs_failure_when_failed', sql.raw(`(state = 'failed') = (failure_code is not null)`)),
  ],
);

/** One time that a job was carried out. `startedAt` is null while a re-run that was asked for waits for its turn. */
export const executions = pgTable(
  'executions',
  {
    id: uuid().primaryKey().defaultRandom(),
    jobHash: text()
      .notNull()
      .references(() => jobs.hash),
    submissionId: uuid()
      .notNull()
      .references(() => submissions.id),
    point: integer().notNull(),
    reason: text({ enum: executionReasons }).notNull(),
    askedBy: uuid()
      .notNull()
      .references(() => accounts.id),
    state: text({ enum: executionStates }).notNull().default('running'),
    createdAt: instant().notNull().defaultNow(),
    startedAt: instant(),
    finishedAt: instant(),
    /** Measured CPU microseconds of all its recorded parts. */
    cpuUs: bigint({ mode: 'number' }).notNull().default(0),
    workers: text().array().notNull().default([]),
    resultDigest: text().references(() => results.digest),
    failureCode: text(),
    failureText: text(),
  },
  (table) => [
    index('executions_job').on(table.jobHash),
    index('executions_submission').on(table.submissionId, table.point),
    uniqueIndex('executions_one_running').on(table.submissionId, table.point).where(sql.raw(`state = 'running'`)),
    check('executions_state', oneOf('state', executionStates)),
    check('executions_reason', oneOf('reason', executionReasons)),
    check('executions_result', sql.raw(`(state = 'finished') = (result_digest is not null)`)),
    check('executions_end', sql.raw(`(state = 'running') = (finished_at is null)`)),
    check('executions_failure', sql.raw(`(state in ('failed', 'broken-off')) = (failure_code is not null)`)),
  ],
);

/** What happened to an execution besides its course: crashes, lost workers, retries. */
export const executionEvents = pgTable(
  'execution_events',
  {
    id: bigint({ mode: 'number' }).primaryKey().generatedAlwaysAsIdentity(),
    executionId: uuid()
      .notNull()
      .references(() => executions.id, { onDelete: 'cascade' }),
    at: instant().notNull().defaultNow(),
    text: text().notNull(),
  },
  (table) => [index('execution_events_execution').on(table.executionId, table.id)],
);
