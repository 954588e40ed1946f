import { sql } from 'drizzle-orm';
import { bigint, boolean, check, doublePrecision, integer, pgTable, uuid } from 'drizzle-orm/pg-core';
import { accounts } from '../accounts.ts';

/** A person's place in the turn order (start-time fair queueing) and the limits that differ from the group's. */
export const turns = pgTable(
  'turns',
  {
    accountId: uuid()
      .primaryKey()
      .references(() => accounts.id, { onDelete: 'cascade' }),
    weight: doublePrecision().notNull().default(1),
    /** Null: the group's setting. */
    maxSlots: integer(),
    weeklyGrantMs: bigint({ mode: 'number' }),
    running: integer().notNull().default(0),
    virtualTime: doublePrecision().notNull().default(0),
    /** Start tag of the submission cut last: the clock among this person's own submissions. */
    clock: doublePrecision().notNull().default(0),
  },
  () => [check('turns_limits', sql.raw('weight > 0 and running >= 0 and (max_slots is null or max_slots >= 0)'))],
);

/** Start tag of the person whose work was cut last: the clock among people. One row. */
export const turnClock = pgTable(
  'turn_clock',
  {
    one: boolean().primaryKey().default(true),
    virtualTime: doublePrecision().notNull().default(0),
  },
  () => [check('turn_clock_one', sql.raw('one'))],
);
