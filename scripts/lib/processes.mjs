import { spawn } from 'node:child_process';
import fs from 'node:fs';
import path from 'node:path';
import { localDir, root } from './paths.mjs';

/** Children of a start script: logs to files, ended together, none left behind. */
export class Processes {
  #children = new Map();
  #logDir;
  #stopping = false;

  /** Logs go to .local/logs/<folder>/<name>.log. */
  constructor(folder = 'start') {
    this.#logDir = path.join(localDir, 'logs', folder);
  }

  /** Starts a TypeScript entry. `ready` is a pattern in its output; its match is what the promise gives. */
  start(name, entry, { args = [], env = {}, ready, onExit } = {}) {
    fs.mkdirSync(this.#logDir, { recursive: true });
    const logFile = path.join(this.#logDir, `${name}.log`);
    const log = fs.createWriteStream(logFile, { flags: 'w' });
    const child = spawn(process.execPath, ['--import', 'tsx', entry, ...args], {
      cwd: root,
      env: { ...process.env, ...env },
      stdio: ['ignore', 'pipe', 'pipe'],
    });
    this.#children.set(name, child);
    return new Promise((resolve, reject) => {
      let seen = '';
      const read = (chunk) => {
        log.write(chunk);
        if (!ready || seen === null) return;
        seen += chunk;
        const match = ready.exec(seen);
        if (match) {
          seen = null;
          resolve(match);
        }
      };
      child.stdout.on('data', read);
      child.stderr.on('data', read);
      child.once('spawn', () => {
        if (!ready) resolve(undefined);
      });
      child.once('error', reject);
      child.once('exit', (code, signal) => {
        this.#children.delete(name);
        if (this.#stopping) return;
        const tail = fs.existsSync(logFile) ? fs.readFileSync(logFile, 'utf8').slice(-3000) : '';
        const error = new Error(
          `${name} ended (${signal ?? `exit ${code}`}); its log is ${path.relative(root, logFile)}:\n${tail}`,
        );
        reject(error);
        onExit?.(error);
      });
    });
  }

  /** SIGTERM to all, SIGKILL to whoever is still there after the grace. */
  async stop(graceMs = 8000) {
    this.#stopping = true;
    const children = [...this.#children.values()];
    const gone = Promise.all(
      children.map((child) =>
        child.exitCode !== null || child.signalCode !== null
          ? undefined
          : new Promise((resolve) => child.once('exit', resolve)),
      ),
    );
    for (const child of children) child.kill('SIGTERM');
    const timer = setTimeout(() => {
      for (const child of children) child.kill('SIGKILL');
    }, graceMs);
    await gone;
    clearTimeout(timer);
  }
}
