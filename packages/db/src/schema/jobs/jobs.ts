import { jobStates } from '@nightcone/contracts';
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
  uuid,
} from 'drizzle-orm/pg-core';
import { accounts } from '../accounts.ts';
import { instant, oneOf } from '../columns.ts';
import { kernels } from '../kernels.ts';
import { results } from './results.ts';

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
