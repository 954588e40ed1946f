import { fileURLToPath } from 'node:url';
import { drizzle } from 'drizzle-orm/node-postgres';
import { migrate as runMigrations } from 'drizzle-orm/node-postgres/migrator';
import pg from 'pg';
import { installTickets } from './queue.ts';

const migrationsFolder = fileURLToPath(new URL('../../../drizzle', import.meta.url));
/** Any fixed number: one migrator at a time, because drizzle itself takes no lock. */
const migrationLock = 20_870_142;

/** The deploy step: brings tables, functions and the ticket queues of a database up to date. Repeatable, safe to race. */
export async function migrate(connectionString: string): Promise<void> {
  const client = new pg.Client({ connectionString, application_name: 'nightcone-migrate' });
  client.on('error', () => {});
  await client.connect();
  try {
    await client.query('select pg_advisory_lock($1)', [migrationLock]);
    await runMigrations(drizzle(client), { migrationsFolder });
    await installTickets(connectionString);
  } finally {
    await client.end();
  }
}
