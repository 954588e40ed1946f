import type { ArrayInfo, Certificate } from '@nightcone/contracts';
import { sql } from 'drizzle-orm';
import { bigint, boolean, check, integer, jsonb, pgTable, primaryKey, text } from 'drizzle-orm/pg-core';
import { bytea, instant, isDigest, oneOf } from '../columns.ts';

export const resultStates = ['kept', 'evicted'] as const;

/** What an execution found, by its result digest: the same bits are one row whoever computed them. */
export const results = pgTable(
  'results',
  {
    digest: text().primaryKey(),
    arrays: jsonb().$type<ArrayInfo[]>().notNull(),
    certificate: jsonb().$type<Certificate>().notNull(),
    bytes: bigint({ mode: 'number' }).notNull(),
    checkFailed: boolean()
      .notNull()
      .generatedAlwaysAs(sql.raw(`jsonb_path_exists(certificate, '$.checks[*] ? (@.holds == false)')`)),
    state: text({ enum: resultStates }).notNull().default('kept'),
    createdAt: instant().notNull().defaultNow(),
  },
  () => [check('results_digest', isDigest('digest')), check('results_state', oneOf('state', resultStates))],
);

/** Bytes of arrays by the SHA-256 of those bytes, shared by all results; name, type and shape are the result's. */
export const resultArrays = pgTable(
  'result_arrays',
  {
    sha256: text().primaryKey(),
    bytes: bigint({ mode: 'number' }).notNull(),
  },
  () => [check('result_arrays_sha256', isDigest('sha256')), check('result_arrays_bytes', sql.raw('bytes >= 0'))],
);

/** The bytes in rows of at most 4 MiB, stored uncompressed so that a piece is read without the rest. */
export const resultArrayRows = pgTable(
  'result_array_rows',
  {
    sha256: text()
      .notNull()
      .references(() => resultArrays.sha256, { onDelete: 'cascade' }),
    number: integer().notNull(),
    data: bytea().notNull(),
  },
  (table) => [
    primaryKey({ columns: [table.sha256, table.number] }),
    check('result_array_rows_size', sql.raw('octet_length(data) <= 4194304')),
  ],
);
