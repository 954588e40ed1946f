import { describe, expect, test } from 'vitest';
import { checkImports } from '../../scripts/architecture/check-imports.ts';
import { importRules } from '../../scripts/architecture/import-rules.ts';
import { readPackages, readSources } from '../../scripts/architecture/read-repository.ts';

test('the repository keeps its import rules', () => {
  const sources = readSources();
  expect(sources.size).toBeGreaterThan(50);
  expect(checkImports(sources, readPackages(), importRules)).toEqual([]);
});

describe('each planted violation is reported', () => {
  const planted: [rule: string, files: Record<string, string>][] = [
    ['packages-import-downwards', { 'packages/contracts/src/a.ts': "import '@nightcone/db';" }],
    ['packages-import-downwards', { 'packages/models/src/a.ts': "export type { X } from '@nightcone/contracts';" }],
    ['packages-import-downwards', { 'apps/web/src/a.ts': "const db = await import('@nightcone/db');" }],
    ['shared-packages-run-in-browsers', { 'packages/provenance/src/a.ts': "import fs from 'node:fs';" }],
    ['web-runs-in-browsers', { 'apps/web/src/a.ts': "import '@nightcone/kernel/node';" }],
    [
      'features-are-islands',
      {
        'apps/web/src/features/jobs/a.ts': "import type { B } from '../sweeps/b.ts';",
        'apps/web/src/features/sweeps/b.ts': 'export type B = 1;',
      },
    ],
    ['sql-lives-in-db', { 'apps/api/src/a.ts': "import { sql } from 'drizzle-orm';" }],
    ['queue-library-behind-one-seam', { 'packages/db/src/queries/a.ts': "import PgBoss from 'pg-boss';" }],
    ['worker-speaks-no-http', { 'apps/worker/src/a.ts': "import http from 'node:http';" }],
    ['no-cycles', { 'apps/api/src/a.ts': "import './b.ts';", 'apps/api/src/b.ts': "import type { A } from './a.ts';" }],
    ['unresolved', { 'apps/api/src/a.ts': "import './gone.ts';" }],
    ['does-not-parse', { 'apps/api/src/a.ts': 'const = 1;' }],
  ];
  test.each(planted)('%s', (rule, files) => {
    const problems = checkImports(new Map(Object.entries(files)), readPackages(), importRules);
    expect(problems.map((problem) => problem.split(':')[0])).toContain(rule);
  });
  test('a rule of the list has a planted violation', () => {
    const tried = new Set(planted.map(([rule]) => rule));
    expect(importRules.map((rule) => rule.name).filter((name) => !tried.has(name))).toEqual([]);
  });
});
