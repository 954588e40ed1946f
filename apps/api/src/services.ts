import type { Db } from '@nightcone/db';
import type { Logger } from 'pino';
import type { Changes } from './changes.ts';
import type { Config } from './config.ts';
import type { Planner } from './planning/planner.ts';

/** What verbs work with; made once by main.ts, or by a test. */
export interface Services {
  config: Config;
  db: Db;
  logger: Logger;
  /** Fan-out of what the database tells. */
  changes: Changes;
  /** Plans sweeps in a worker thread. */
  planner: Planner;
}
