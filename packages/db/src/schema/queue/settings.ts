import { sql } from 'drizzle-orm';
import { bigint, check, integer, pgTable, text, time, uuid } from 'drizzle-orm/pg-core';
import { accounts } from '../accounts.ts';
import { instant } from '../columns.ts';

/** The group's settings, versioned: the row with the highest version counts; none is ever changed. */
export const settings = pgTable(
  'settings',
  {
    version: integer().primaryKey().generatedAlwaysAsIdentity(),
    groupName: text().notNull(),
    timeZone: text().notNull().default('UTC'),
    nightFrom: time().notNull().default('20:00'),
    nightTo: time().notNull().default('07:00'),
    /** Reference CPU a week for each person, unless a person has a number of his own. */
    weeklyGrantMs: bigint({ mode: 'number' }).notNull().default(360_000_000),
    /** Slots that one person's work may hold at once. */
    maxSlots: integer().notNull().default(8),
    /** CPU that one chunk should take, and where it must yield. */
    chunkMs: integer().notNull().default(2000),
    chunkBudgetMs: integer().notNull().default(4000),
    changedBy: uuid().references(() => accounts.id),
    createdAt: instant().notNull().defaultNow(),
  },
  () => [
    check(
      'settings_limits',
      sql.raw('weekly_grant_ms >= 0 and max_slots > 0 and chunk_ms > 0 and chunk_budget_ms >= chunk_ms'),
    ),
  ],
);
