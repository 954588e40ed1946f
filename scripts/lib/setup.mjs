// What `npm start` and `npm test` share: everything a fresh machine needs before TypeScript can run.
import { spawn, spawnSync } from 'node:child_process';
import { createHash } from 'node:crypto';
import fs from 'node:fs';
import path from 'node:path';
import { localDir, root } from './paths.mjs';

export function say(text) {
  console.log(text);
}

/** Ends with 2 and a sentence when this Node.js cannot run Nightcone. */
export function requireNode() {
  const [major, minor] = process.versions.node.split('.').map(Number);
  if (major === 20 && minor >= 19) return;
  console.error(
    `Nightcone runs on Node.js 20 (20.19 or later); this is ${process.version}. Install Node.js 20 and start again.`,
  );
  process.exit(2);
}

/** Ends with 2 when the checkout cannot be written to. */
export function requireWritable() {
  try {
    fs.mkdirSync(localDir, { recursive: true });
    fs.accessSync(root, fs.constants.W_OK);
    fs.accessSync(localDir, fs.constants.W_OK);
  } catch {
    console.error(
      `This user cannot write to ${root}. Use a checkout of your own: packages, build and database are kept in it.`,
    );
    process.exit(2);
  }
}

/** SHA-256 over names and contents of the files below the given paths, in a fixed order. */
function fingerprint(paths) {
  const hash = createHash('sha256');
  const visit = (file) => {
    const stat = fs.statSync(file, { throwIfNoEntry: false });
    if (!stat) return;
    if (stat.isDirectory()) {
      for (const name of fs.readdirSync(file).sort()) {
        if (name !== 'node_modules' && name !== 'dist') visit(path.join(file, name));
      }
    } else
      hash
        .update(`${path.relative(root, file)}\0`)
        .update(fs.readFileSync(file))
        .update('\0');
  };
  for (const entry of paths) visit(path.join(root, entry));
  return hash.digest('hex');
}

/** Runs `work` unless its inputs are those of the last successful run and its output is still there. */
async function onceFor(name, inputs, output, work) {
  const stamp = path.join(localDir, `${name}.stamp`);
  const now = fingerprint(inputs);
  const last = fs.existsSync(stamp) ? fs.readFileSync(stamp, 'utf8') : '';
  if (last === now && fs.existsSync(path.join(root, output))) return false;
  fs.rmSync(stamp, { force: true });
  await work();
  fs.writeFileSync(stamp, now);
  return true;
}

/** A command that must succeed; its output is shown only when it fails. */
export function command(title, file, args, options = {}) {
  return new Promise((resolve, reject) => {
    const child = spawn(file, args, { cwd: root, stdio: ['ignore', 'pipe', 'pipe'], ...options });
    let output = '';
    child.stdout?.on('data', (chunk) => (output += chunk));
    child.stderr?.on('data', (chunk) => (output += chunk));
    child.once('error', (error) => reject(new Error(`${title} could not be started: ${error.message}`)));
    child.once('exit', (code) =>
      code === 0 ? resolve(output) : reject(new Error(`${title} failed (exit ${code}):\n${output}`)),
    );
  });
}

export const node = (title, args, options) => command(title, process.execPath, args, options);
export const typescript = (title, file, args = [], options) => node(title, ['--import', 'tsx', file, ...args], options);

/** The packages of the lock file. A tree that npm itself finds complete is taken as it is. */
export async function ensurePackages() {
  await onceFor('packages', ['package-lock.json', 'package.json', '.npmrc'], 'node_modules', async () => {
    if (fs.existsSync(path.join(root, 'node_modules')) && spawnSync('npm', ['ls', '--all'], { cwd: root }).status === 0)
      return;
    say('Installing packages (npm ci) …');
    await command('npm ci', 'npm', ['ci', '--no-audit', '--no-fund']);
  });
}

export async function ensureKernel() {
  await onceFor(
    'kernel',
    [
      'packages/kernel/assembly',
      'packages/kernel/src/build',
      'packages/kernel/kernel.lock.json',
      'packages/models/src',
    ],
    'packages/kernel/build/kernel.wasm',
    async () => {
      say('Building the kernel …');
      await command('The kernel build', 'npm', ['run', 'build', '-w', '@nightcone/kernel', '--silent']);
    },
  );
}

export async function ensureWeb() {
  await onceFor(
    'web',
    [
      'apps/web',
      'packages/contracts/src',
      'packages/models/src',
      'packages/drawing/src',
      'packages/provenance/src',
      'packages/kernel/src',
      'vite.config.ts',
      'package-lock.json',
    ],
    'apps/web/dist/index.html',
    async () => {
      say('Building the web application …');
      await node('The web build', [path.join(root, 'node_modules/vite/bin/vite.js'), 'build', '--logLevel', 'warn']);
    },
  );
}

/** Path of a Chromium, or undefined. */
export function findChromium() {
  return ['/usr/bin/chromium', '/usr/bin/chromium-browser', '/usr/bin/google-chrome'].find((file) =>
    fs.existsSync(file),
  );
}

export function hasScipy() {
  return spawnSync('/usr/bin/python3', ['-c', 'import numpy, scipy']).status === 0;
}
