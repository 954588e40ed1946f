import { type ChildProcess, spawn } from 'node:child_process';
import { createInterface } from 'node:readline';

export interface LogLine {
  level: number;
  msg: string;
  [member: string]: unknown;
}

/** A worker in a process of its own, as `npm run worker` starts it. */
export class WorkerProcess {
  readonly lines: LogLine[] = [];
  readonly exited: Promise<{ code: number | null; signal: string | null }>;
  readonly #child: ChildProcess;
  readonly #waiting = new Set<(line: LogLine) => void>();
  #errors = '';

  private constructor(entry: string, args: string[], databaseUrl: string) {
    this.#child = spawn(process.execPath, ['--import', 'tsx', new URL(entry, import.meta.url).pathname, ...args], {
      env: { ...process.env, NIGHTCONE_DATABASE_URL: databaseUrl, NIGHTCONE_LOG_LEVEL: 'debug' },
      stdio: ['ignore', 'pipe', 'pipe'],
    });
    this.#child.stderr?.on('data', (text) => {
      this.#errors += text;
    });
    createInterface({ input: this.#child.stdout as NodeJS.ReadableStream }).on('line', (text) => {
      const line = JSON.parse(text) as LogLine;
      this.lines.push(line);
      for (const hear of this.#waiting) hear(line);
    });
    this.exited = new Promise((resolve) => {
      this.#child.once('exit', (code, signal) => resolve({ code, signal }));
    });
  }

  /** Resolves when the worker has joined the database. */
  static async start(databaseUrl: string, { fake }: { fake: boolean }): Promise<WorkerProcess> {
    const worker = fake
      ? new WorkerProcess('./fake-worker.ts', [], databaseUrl)
      : new WorkerProcess('../../apps/worker/src/main.ts', ['--slots', '2'], databaseUrl);
    await worker.logged('worker joined');
    return worker;
  }

  /** Its name in the tables. */
  get id(): string {
    return String(this.lines.find(({ msg }) => msg === 'worker joined')?.worker);
  }

  get isAlive(): boolean {
    return this.#child.exitCode === null && this.#child.signalCode === null;
  }

  /** Tasks that this process has carried out in chunks that it ended. */
  get tasksEnded(): number {
    return this.lines.reduce((sum, { msg, tasks }) => sum + (msg === 'chunk ended' ? Number(tasks) : 0), 0);
  }

  /** Resolves when this has been logged; fails when the process ends before. */
  logged(message: string): Promise<LogLine> {
    const found = this.lines.find(({ msg }) => msg === message);
    if (found) return Promise.resolve(found);
    return new Promise((resolve, reject) => {
      const hear = (line: LogLine) => {
        if (line.msg !== message) return;
        this.#waiting.delete(hear);
        resolve(line);
      };
      this.#waiting.add(hear);
      void this.exited.then(({ code, signal }) =>
        reject(new Error(`the worker ended (${code ?? signal}) before it said '${message}': ${this.#errors}`)),
      );
    });
  }

  signal(signal: 'SIGKILL' | 'SIGSTOP' | 'SIGCONT' | 'SIGTERM'): void {
    this.#child.kill(signal);
  }

  /** For the end of a test: no process stays, in whatever state it is. */
  async end(): Promise<void> {
    if (this.isAlive) this.#child.kill('SIGKILL');
    await this.exited;
  }
}
