import { bigint, index, jsonb, pgTable, text, uuid } from 'drizzle-orm/pg-core';
import { instant } from './columns.ts';

/** Who did what, on which thing, from what to what: append-only, written in the transaction of the change. */
export const auditEntries = pgTable(
  'audit_entries',
  {
    id: bigint({ mode: 'number' }).primaryKey().generatedAlwaysAsIdentity(),
    at: instant().notNull().defaultNow(),
    /** Null: the machinery itself. */
    actorId: uuid(),
    /** feature.verb, e.g. `sweeps.submit`. */
    action: text().notNull(),
    /** Kind and id of what was changed, e.g. `submission`. */
    subject: text().notNull(),
    subjectId: text().notNull(),
    before: jsonb(),
    after: jsonb(),
    requestId: text(),
  },
  (table) => [
    index('audit_entries_subject').on(table.subject, table.subjectId),
    index('audit_entries_at').on(table.at),
  ],
);
