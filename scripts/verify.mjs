// npm run verify: format, lint, types and the architecture's rules; no database, under a minute.
import path from 'node:path';
import { root } from './lib/paths.mjs';
import { command, ensurePackages, node, requireNode, say } from './lib/setup.mjs';

/** Runs all checks; throws with the output of those that failed. */
export async function verify() {
  const started = performance.now();
  const bin = (name) => path.join(root, 'node_modules/.bin', name);
  const projects = [
    'packages/models',
    'packages/contracts',
    'packages/kernel',
    'packages/provenance',
    'packages/drawing',
    'packages/db',
    'apps/api',
    'apps/worker',
    'apps/cli',
    'apps/web',
    'scripts',
  ];
  const outcomes = await Promise.allSettled([
    command('Format and lint', bin('biome'), ['ci', '.']),
    (async () => {
      for (const project of projects) await command(`Types of ${project}`, bin('tsc'), ['-p', project]);
    })(),
    node('The rules of the architecture', [
      path.join(root, 'node_modules/vitest/vitest.mjs'),
      'run',
      '--project',
      'unit',
      'tests/architecture',
    ]),
  ]);
  const failures = outcomes.filter((outcome) => outcome.status === 'rejected').map((outcome) => outcome.reason.message);
  if (failures.length > 0) throw new Error(failures.join('\n\n'));
  say(`Format, lint, types and architecture hold (${((performance.now() - started) / 1000).toFixed(0)} s).`);
}

if (process.argv[1]?.endsWith('verify.mjs')) {
  requireNode();
  await ensurePackages();
  await verify().catch((error) => {
    console.error(error.message);
    process.exitCode = 1;
  });
}
