import { drizzle, type NodePgDatabase } from 'drizzle-orm/node-postgres';
import pg from 'pg';
import * as schema from './schema.ts';

export interface PoolOptions {
  /** Connections at most: slots + 2 for a worker. */
  max?: number;
  /** Told about connections that broke while nobody was waiting for their answer. */
  onError?: (error: Error) => void;
  /** A statement that has no answer by then is given up. */
  queryTimeoutMs?: number;
}

/**
 * A pool that survives restarts of the server. `query_timeout` ends queries on half-open connections, and a client that
 * is checked out has no listener of the pool, so each gets its own: an 'error' event without a listener ends the process.
 * A process that stops or a machine that vanishes inside a transaction must not hold its locks: the server ends it.
 */
export function createPool(
  connectionString: string,
  { max = 10, onError = () => {}, queryTimeoutMs = 30_000 }: PoolOptions = {},
): pg.Pool {
  const pool = new pg.Pool({
    connectionString,
    max,
    connectionTimeoutMillis: 5_000,
    query_timeout: queryTimeoutMs,
    idle_in_transaction_session_timeout: 5_000,
    keepAlive: true,
    application_name: 'nightcone',
    // Our statements are short, but their estimates are high (set-returning functions): compiling them took 2–4 s each.
    options: '-c jit=off',
  });
  pool.on('error', onError);
  pool.on('connect', (client) => client.on('error', onError));
  return pool;
}

/** For those who hand a pool on: the session store of the API. */
export type Pool = pg.Pool;

export const createDb = (pool: pg.Pool) => drizzle(pool, { schema, casing: 'snake_case' });
export type Db = ReturnType<typeof createDb>;
/** Inside `db.transaction(async (tx) => …)`. */
export type Transaction = Parameters<Parameters<Db['transaction']>[0]>[0];
/** What a query function takes: the database or a transaction on it. */
export type Queryable = NodePgDatabase<typeof schema> | Transaction;
