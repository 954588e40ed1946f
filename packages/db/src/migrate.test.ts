import { execFileSync } from 'node:child_process';
import { cpSync, mkdtempSync, readdirSync, rmSync, writeFileSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join, relative } from 'node:path';
import { fileURLToPath } from 'node:url';
import { expect, test } from 'vitest';
import { createTestDatabase } from '../testing/index.ts';
import { migrate } from './migrate.ts';

const at = (path: string) => fileURLToPath(new URL(`../../../${path}`, import.meta.url));

test('the migrations make exactly the schema: nothing is left to generate', () => {
  const scratch = mkdtempSync(join(tmpdir(), 'nightcone-migrations-'));
  try {
    cpSync(at('drizzle'), join(scratch, 'drizzle'), { recursive: true });
    const before = readdirSync(join(scratch, 'drizzle'));
    const config = join(scratch, 'drizzle.config.json');
    writeFileSync(
      config,
      JSON.stringify({
        dialect: 'postgresql',
        // drizzle-kit understands only paths relative to where it runs
        schema: './packages/db/src/schema/**/*.ts',
        out: relative(at('.'), join(scratch, 'drizzle')),
        casing: 'snake_case',
      }),
    );
    const output = execFileSync(
      process.execPath,
      [at('node_modules/drizzle-kit/bin.cjs'), 'generate', `--config=${config}`],
      {
        cwd: at('.'),
        encoding: 'utf8',
        stdio: ['ignore', 'pipe', 'pipe'],
      },
    );
    expect(output).toContain('No schema changes');
    expect(readdirSync(join(scratch, 'drizzle'))).toEqual(before);
  } finally {
    rmSync(scratch, { recursive: true });
  }
}, 60_000);

test('several deploy steps at once, and again, leave one schema', async () => {
  const database = await createTestDatabase();
  try {
    await database.pool.query(
      'drop schema drizzle, pgboss, queue cascade; drop schema public cascade; create schema public',
    );
    await Promise.all([1, 2, 3].map(() => migrate(database.url)));
    await migrate(database.url);
    const { rows } = await database.pool.query('select count(*)::int as n from settings');
    expect(rows).toEqual([{ n: 1 }]);
  } finally {
    await database.drop();
  }
}, 60_000);
