import { bigint, check, index, jsonb, pgTable, text, uuid } from 'drizzle-orm/pg-core';
import { accounts } from './accounts.ts';
import { bytea, instant, isDigest } from './columns.ts';

/** Uploaded profiles, immutable, by the digest of their columns in the units of their roles. */
export const tables = pgTable(
  'tables',
  {
    digest: text().primaryKey(),
    /** [{ role, unit, count }] */
    columns: jsonb().$type<{ role: string; unit: string; count: number }[]>().notNull(),
    /** The columns one after the other as little-endian doubles. */
    bytes: bytea().notNull(),
    createdAt: instant().notNull().defaultNow(),
  },
  () => [check('tables_digest', isDigest('digest'))],
);

/** Who has a table: a job that uses tables is visible to whoever holds every one of them. */
export const tableHoldings = pgTable(
  'table_holdings',
  {
    id: bigint({ mode: 'number' }).primaryKey().generatedAlwaysAsIdentity(),
    tableDigest: text()
      .notNull()
      .references(() => tables.digest),
    accountId: uuid()
      .notNull()
      .references(() => accounts.id),
    name: text().notNull(),
    fileDigest: text(),
    /** The result, array and cut that it was made from; null for an upload. */
    origin: jsonb(),
    createdAt: instant().notNull().defaultNow(),
  },
  (table) => [index('table_holdings_table').on(table.tableDigest), index('table_holdings_account').on(table.accountId)],
);
