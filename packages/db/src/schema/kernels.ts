import { kernelStates } from '@nightcone/contracts';
import { sql } from 'drizzle-orm';
import { check, jsonb, pgTable, text, uniqueIndex } from 'drizzle-orm/pg-core';
import { bytea, instant, oneOf } from './columns.ts';

/** Every released kernel with its bytes; a retired one still runs on request. */
export const kernels = pgTable(
  'kernels',
  {
    digest: text().primaryKey(),
    version: text().notNull(),
    bytes: bytea().notNull(),
    manifest: jsonb().notNull(),
    state: text({ enum: kernelStates }).notNull().default('released'),
    releasedAt: instant().notNull().defaultNow(),
  },
  (table) => [
    uniqueIndex('kernels_one_current').on(table.state).where(sql.raw(`state = 'current'`)),
    check('kernels_state', oneOf('state', kernelStates)),
    check('kernels_digest', sql.raw(`digest = encode(sha256(bytes), 'hex')`)),
  ],
);
