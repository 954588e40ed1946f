import { sql } from 'drizzle-orm';
import { bigint, check, index, pgTable, text, unique, uuid } from 'drizzle-orm/pg-core';
import { accounts } from './accounts.ts';
import { instant, oneOf } from './columns.ts';

export const quotaEntryKinds = ['grant', 'reserve', 'settle', 'release', 'adjust'] as const;

/** Reference CPU milliseconds of one person in one week; always the sum of its entries. */
export const quotaBalances = pgTable(
  'quota_balances',
  {
    id: uuid().primaryKey().defaultRandom(),
    accountId: uuid()
      .notNull()
      .references(() => accounts.id),
    /** Monday 00:00 in the group's time zone. */
    weekStart: instant().notNull(),
    weekEnd: instant().notNull(),
    grantedMs: bigint({ mode: 'number' }).notNull().default(0),
    reservedMs: bigint({ mode: 'number' }).notNull().default(0),
    usedMs: bigint({ mode: 'number' }).notNull().default(0),
  },
  (table) => [
    unique('quota_balances_week').on(table.accountId, table.weekStart),
    check('quota_balances_not_negative', sql.raw('granted_ms >= 0 and reserved_ms >= 0 and used_ms >= 0')),
  ],
);

/** The ledger, append-only: what each entry adds to the three sides of its balance. */
export const quotaEntries = pgTable(
  'quota_entries',
  {
    id: bigint({ mode: 'number' }).primaryKey().generatedAlwaysAsIdentity(),
    balanceId: uuid()
      .notNull()
      .references(() => quotaBalances.id),
    at: instant().notNull().defaultNow(),
    kind: text({ enum: quotaEntryKinds }).notNull(),
    grantedMs: bigint({ mode: 'number' }).notNull().default(0),
    reservedMs: bigint({ mode: 'number' }).notNull().default(0),
    usedMs: bigint({ mode: 'number' }).notNull().default(0),
    reason: text().notNull(),
    submissionId: uuid(),
    chunkId: uuid(),
  },
  (table) => [
    index('quota_entries_balance').on(table.balanceId, table.id),
    check('quota_entries_kind', oneOf('kind', quotaEntryKinds)),
    check(
      'quota_entries_sides',
      sql.raw(`case kind
    when 'grant' then granted_ms >= 0 and reserved_ms = 0 and used_ms = 0
    when 'reserve' then granted_ms = 0 and reserved_ms > 0 and used_ms = 0
    when 'settle' then granted_ms = 0 and reserved_ms <= 0 and used_ms >= 0
    when 'release' then granted_ms = 0 and reserved_ms < 0 and used_ms = 0
    else reserved_ms = 0 end`),
    ),
    check('quota_entries_submission', sql.raw(`kind in ('grant', 'adjust') or submission_id is not null`)),
  ],
);
