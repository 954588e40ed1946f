import { executionStates } from '@nightcone/contracts';
import { sql } from 'drizzle-orm';
import { bigint, check, index, integer, pgTable, text, uniqueIndex, uuid } from 'drizzle-orm/pg-core';
import { accounts } from '../accounts.ts';
import { instant, oneOf } from '../columns.ts';
import { submissions } from '../queue/submissions.ts';
import { jobs } from './jobs.ts';
import { results } from './results.ts';

export const executionReasons = ['first', 're-run', 'audit', 'restore'] as const;

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
