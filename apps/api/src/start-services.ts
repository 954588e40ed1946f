import { createDb, createPool, findOptionalKernelBytes, listen, type Pool } from '@nightcone/db';
import type { Logger } from 'pino';
import { Changes } from './changes.ts';
import type { Config } from './config.ts';
import { Planner } from './planning/planner.ts';
import type { Services } from './services.ts';

export interface RunningServices {
  services: Services;
  pool: Pool;
  stop: () => Promise<void>;
}

/** Opens what the API works with: a pool, one listening connection, the planning thread. */
export function startServices(config: Config, logger: Logger): RunningServices {
  const pool = createPool(config.databaseUrl, {
    onError: (error) => logger.warn({ reason: error.message }, 'database connection lost'),
  });
  const db = createDb(pool);
  const changes = new Changes();
  const listener = listen(
    config.databaseUrl,
    (message) => changes.tell(message),
    (error) => logger.warn({ reason: error.message }, 'listening connection lost'),
  );
  const planner = new Planner(async (digest) => {
    const bytes = await findOptionalKernelBytes(db, digest);
    if (!bytes) throw new Error(`kernel ${digest} has no bytes`);
    return bytes;
  });
  const stop = async () => {
    await planner.stop();
    await listener.stop();
    await pool.end();
  };
  return { services: { config, db, logger, changes, planner }, pool, stop };
}
