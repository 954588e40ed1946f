import { randomBytes } from 'node:crypto';
import pg from 'pg';
import { inject } from 'vitest';
import { createDb, createPool, type Db } from '../src/client.ts';
// What the set-up of a test run provides.
import type {} from './server.ts';

export * from './fixtures.ts';

export interface TestDatabase {
  url: string;
  pool: pg.Pool;
  db: Db;
  /** Closes the pool and drops the database. Call it in afterAll or afterEach. */
  drop: () => Promise<void>;
}

/** A database of one's own, cloned from the migrated template (about 50 ms). */
export async function createTestDatabase(): Promise<TestDatabase> {
  const template = new URL(inject('templateDatabaseUrl'));
  const name = `test_${randomBytes(6).toString('hex')}`;
  const server = new URL(template);
  server.pathname = '/postgres';
  const administer = async (statement: string) => {
    const client = new pg.Client({ connectionString: server.href });
    await client.connect();
    await client.query(statement).finally(() => client.end());
  };
  await administer(`create database ${name} template ${template.pathname.slice(1)} strategy file_copy`);
  const url = new URL(template);
  url.pathname = `/${name}`;
  const pool = createPool(url.href, { max: 10 });
  return {
    url: url.href,
    pool,
    db: createDb(pool),
    drop: async () => {
      await pool.end();
      await administer(`drop database if exists ${name} with (force)`);
    },
  };
}
