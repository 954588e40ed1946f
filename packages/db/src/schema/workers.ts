import { workerStates } from '@nightcone/contracts';
import { sql } from 'drizzle-orm';
import { bigint, check, doublePrecision, index, integer, pgTable, text, time } from 'drizzle-orm/pg-core';
import { instant, oneOf } from './columns.ts';

/** Worker processes that have joined this database. */
export const workers = pgTable(
  'workers',
  {
    /** host, process and a random part: never used twice. */
    id: text().primaryKey(),
    host: text().notNull(),
    pid: integer().notNull(),
    slots: integer().notNull(),
    memoryBytes: bigint({ mode: 'number' }).notNull(),
    /** Reference CPU = measured CPU × factor; 1 on the machine of the calibration. */
    speedFactor: doublePrecision().notNull().default(1),
    kernelDigests: text().array().notNull().default([]),
    /** Outside these hours of its own it takes no work; null: always on. */
    worksFrom: time(),
    worksTo: time(),
    state: text({ enum: workerStates }).notNull().default('active'),
    startedAt: instant().notNull().defaultNow(),
    heartbeatAt: instant().notNull().defaultNow(),
    stoppedAt: instant(),
  },
  (table) => [
    index('workers_state').on(table.state),
    check('workers_state', oneOf('state', workerStates)),
    check('workers_size', sql.raw('slots > 0 and memory_bytes > 0 and speed_factor > 0')),
    check('workers_hours', sql.raw('(works_from is null) = (works_to is null)')),
  ],
);
