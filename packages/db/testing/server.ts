import { execFileSync } from 'node:child_process';
import { randomBytes } from 'node:crypto';
import pg from 'pg';
import type { TestProject } from 'vitest/node';
import { migrate } from '../src/migrate.ts';

declare module 'vitest' {
  export interface ProvidedContext {
    /** URL of a migrated database that nobody connects to; tests clone it. */
    templateDatabaseUrl: string;
  }
}

function serverUrl(): string {
  const { NIGHTCONE_TEST_SERVER_URL } = process.env;
  if (NIGHTCONE_TEST_SERVER_URL) return NIGHTCONE_TEST_SERVER_URL;
  const script = new URL('../../../scripts/postgres.mjs', import.meta.url).pathname;
  return execFileSync(process.execPath, [script, 'start', '--purpose', 'test'], { encoding: 'utf8' }).trim();
}

/** Once per run of the database tests: a migrated template on the test server. */
export default async function setup(project: TestProject): Promise<() => Promise<void>> {
  const server = serverUrl();
  const name = `template_${randomBytes(6).toString('hex')}`;
  const administer = async (statement: string) => {
    const client = new pg.Client({ connectionString: server });
    await client.connect();
    await client.query(statement).finally(() => client.end());
  };
  await administer(`create database ${name}`);
  const template = new URL(server);
  template.pathname = `/${name}`;
  await migrate(template.href);
  project.provide('templateDatabaseUrl', template.href);
  return () => administer(`drop database if exists ${name} with (force)`);
}
