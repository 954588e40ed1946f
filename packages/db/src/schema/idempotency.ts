import { check, index, jsonb, pgTable, primaryKey, text, uuid } from 'drizzle-orm/pg-core';
import { accounts } from './accounts.ts';
import { instant, isDigest } from './columns.ts';

/** A write that was asked for under a key is done once; asked again it gives the same answer. */
export const idempotencyKeys = pgTable(
  'idempotency_keys',
  {
    accountId: uuid()
      .notNull()
      .references(() => accounts.id, { onDelete: 'cascade' }),
    key: text().notNull(),
    /** SHA-256 of endpoint and body: another input under the same key is refused. */
    requestHash: text().notNull(),
    response: jsonb(),
    createdAt: instant().notNull().defaultNow(),
  },
  (table) => [
    primaryKey({ columns: [table.accountId, table.key] }),
    index('idempotency_keys_created').on(table.createdAt),
    check('idempotency_keys_hash', isDigest('request_hash')),
  ],
);
