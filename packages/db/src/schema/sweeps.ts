import { index, jsonb, pgTable, text, uuid } from 'drizzle-orm/pg-core';
import { accounts } from './accounts.ts';
import { instant } from './columns.ts';
import { submissions } from './queue/submissions.ts';

export interface SweepDefinition {
  /** The base specification, every default written out. */
  specification: unknown;
  /** values[i] has one JSON value per pointer. */
  axes: { pointers: string[]; values: unknown[][] }[];
}

/** Jobs made by varying parameters, watched together. Its points are those of its submission. */
export const sweeps = pgTable(
  'sweeps',
  {
    id: uuid().primaryKey().defaultRandom(),
    submissionId: uuid()
      .notNull()
      .unique()
      .references(() => submissions.id),
    ownerId: uuid()
      .notNull()
      .references(() => accounts.id),
    title: text().notNull(),
    model: text().notNull(),
    definition: jsonb().$type<SweepDefinition>().notNull(),
    createdAt: instant().notNull().defaultNow(),
  },
  (table) => [index('sweeps_owner').on(table.ownerId, table.createdAt, table.id)],
);

export const sweepDrafts = pgTable(
  'sweep_drafts',
  {
    id: uuid().primaryKey().defaultRandom(),
    ownerId: uuid()
      .notNull()
      .references(() => accounts.id, { onDelete: 'cascade' }),
    title: text().notNull(),
    model: text().notNull(),
    body: jsonb().notNull(),
    createdAt: instant().notNull().defaultNow(),
    updatedAt: instant().notNull().defaultNow(),
  },
  (table) => [index('sweep_drafts_owner').on(table.ownerId, table.updatedAt)],
);
