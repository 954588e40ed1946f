// npm test: all set-up, then every group of tests. The last line is "N passed, N failed[, N skipped]".
import { spawn } from 'node:child_process';
import fs from 'node:fs';
import path from 'node:path';
import { localDir, root } from './lib/paths.mjs';
import { aptInstall } from './lib/postgres-install.mjs';
import {
  ensureKernel,
  ensurePackages,
  ensureWeb,
  findChromium,
  hasScipy,
  requireNode,
  requireWritable,
  say,
} from './lib/setup.mjs';
import { startPostgres, stopPostgres } from './postgres.mjs';
import { verify } from './verify.mjs';

const groups = ['unit', 'web', 'database', 'reference', 'e2e'];

/** One group in a process of its own; resolves to its counts. A group that cannot even start counts as one failure. */
function runGroup(group, env) {
  const report = path.join(localDir, `test-${group}.json`);
  fs.rmSync(report, { force: true });
  const args = [
    path.join(root, 'node_modules/vitest/vitest.mjs'),
    'run',
    '--project',
    group,
    '--reporter=default',
    '--reporter=json',
    `--outputFile.json=${report}`,
  ];
  return new Promise((resolve) => {
    const child = spawn(process.execPath, args, { cwd: root, stdio: 'inherit', env: { ...process.env, ...env } });
    child.once('exit', (code) => {
      const {
        numPassedTests = 0,
        numFailedTests = 0,
        numPendingTests = 0,
      } = fs.existsSync(report) ? JSON.parse(fs.readFileSync(report, 'utf8')) : {};
      const failed = code === 0 ? numFailedTests : Math.max(1, numFailedTests);
      resolve({ passed: numPassedTests, failed, skipped: numPendingTests });
    });
  });
}

/** Chromium and SciPy come from Debian; without them their groups say that they are skipped. */
function installTestTools() {
  const wanted = [...(findChromium() ? [] : ['chromium']), ...(hasScipy() ? [] : ['python3-numpy', 'python3-scipy'])];
  if (wanted.length === 0) return;
  say(`Installing ${wanted.join(', ')} from Debian for the tests …`);
  if (!aptInstall(wanted)) say(`Could not install ${wanted.join(', ')}; the tests that need them are skipped.`);
}

requireNode();
requireWritable();
await ensurePackages();
installTestTools();
const total = { passed: 0, failed: 0, skipped: 0 };
const add = (counts) => {
  for (const key of Object.keys(total)) total[key] += counts[key];
};
try {
  await verify();
  add({ passed: 1, failed: 0, skipped: 0 });
} catch (error) {
  console.error(error.message);
  add({ passed: 0, failed: 1, skipped: 0 });
}
try {
  const server = await startPostgres('test');
  await ensureKernel();
  await ensureWeb();
  for (const group of groups) {
    say(`\n── ${group} ──`);
    add(await runGroup(group, { NIGHTCONE_TEST_SERVER_URL: server }));
  }
} catch (error) {
  console.error(error.message);
  add({ passed: 0, failed: 1, skipped: 0 });
} finally {
  stopPostgres('test');
}
process.exitCode = total.failed === 0 ? 0 : 1;
say(`\n${total.passed} passed, ${total.failed} failed${total.skipped > 0 ? `, ${total.skipped} skipped` : ''}`);
