import { createDb, createPool, findOptionalKernelBytes, findOptionalTable, retry } from '@nightcone/db';
import { heartbeatMs, Queue, type QueueMessage } from '@nightcone/db/queue';
import type { Logger } from 'pino';
import { KernelStore } from './features/kernels/kernel-store.ts';
import type { ChunkRun } from './features/queue/chunk-run.ts';
import { runSlot } from './features/queue/run-slot.ts';
import { TableStore } from './features/tables/table-store.ts';
import { describeWorker } from './features/workers/describe-worker.ts';
import { jobInputs } from './job-inputs.ts';
import { ThreadPool } from './threads/thread-pool.ts';
import { WakeSignal } from './wake-signal.ts';

/** Time that a stop leaves to the tasks in hand before it drops them. */
const graceMs = 3000;

export interface WorkerOptions {
  databaseUrl: string;
  slots: number;
  log: Logger;
  /** The program of the compute threads, for tests. */
  threadEntry?: URL;
}

/** A worker process: joins the database, computes in its slots what the queue hands out, and leaves in good order. */
export class ComputeWorker {
  readonly #log: Logger;
  readonly #threads: ThreadPool;
  readonly #queue: Queue;
  readonly #wake = new WakeSignal();
  readonly #runs = new Set<ChunkRun>();
  readonly #stopping = new AbortController();
  readonly #pool: ReturnType<typeof createPool>;
  #slots: Promise<void>[] = [];
  #timer: NodeJS.Timeout | undefined;
  #stopped: Promise<void> | undefined;

  constructor({ databaseUrl, slots, log, threadEntry }: WorkerOptions) {
    this.#log = log;
    this.#threads = new ThreadPool({ size: slots, entry: threadEntry });
    const onError = (error: Error) => log.warn({ reason: error.message }, 'trouble with the database');
    this.#pool = createPool(databaseUrl, { max: 1, onError });
    this.#queue = new Queue({ connectionString: databaseUrl, worker: describeWorker(slots, 1), onError });
  }

  async start(): Promise<void> {
    const { worker } = this.#queue;
    await this.#queue.start();
    this.#queue.listen((message) => this.#hear(message));
    const jobOf = this.#jobInputs();
    this.#slots = this.#threads.threads.map((thread, number) =>
      runSlot({
        queue: this.#queue,
        thread,
        // One slot of several is kept for what is quickly done, so that long parts never fill everything.
        offer: { express: number === 1, memoryBytes: worker.memoryBytes / worker.slots },
        jobOf,
        wake: this.#wake,
        runs: this.#runs,
        stopping: this.#stopping.signal,
        log: this.#log,
      }),
    );
    this.#beatLater();
    this.#log.info({ worker: worker.id, slots: worker.slots, memoryBytes: worker.memoryBytes }, 'worker joined');
  }

  /** Ends at the next end of a task, after the grace time in the middle of one; what is unfinished is given back. */
  stop(): Promise<void> {
    this.#stopped ??= this.#leave();
    return this.#stopped;
  }

  async #leave(): Promise<void> {
    this.#log.info({ running: this.#runs.size }, 'worker stops');
    this.#stopping.abort();
    this.#wake.wake();
    for (const run of this.#runs) run.obey('yield');
    const impatience = setTimeout(() => {
      for (const run of this.#runs) run.stop('the worker stops');
    }, graceMs);
    await Promise.all(this.#slots);
    clearTimeout(impatience);
    clearTimeout(this.#timer);
    await this.#threads.close();
    await this.#queue.stop();
    await this.#pool.end();
    this.#log.info('worker left');
  }

  #jobInputs() {
    const db = createDb(this.#pool);
    const patiently = <T>(query: () => Promise<T>) =>
      retry(query, (error) => this.#log.warn({ reason: error.message }, 'trouble with the database'));
    const kernels = new KernelStore((digest) => patiently(() => findOptionalKernelBytes(db, digest)));
    const tables = new TableStore((digest) => patiently(() => findOptionalTable(db, digest)));
    return jobInputs(kernels, tables);
  }

  #hear({ topic, id }: QueueMessage): void {
    if (topic === 'work' || topic === 'connected') this.#wake.wake();
    if (topic !== 'cancel' && topic !== 'pause') return;
    for (const run of this.#runs) {
      if (run.chunk.submissionId === id) run.obey(topic === 'cancel' ? 'cancel' : 'yield');
    }
  }

  #beatLater(): void {
    this.#timer = setTimeout(() => void this.#beat().finally(() => this.#beatLater()), heartbeatMs);
  }

  /** Signs of life and orders for all running chunks; then the leases of workers that gave none are taken away. */
  async #beat(): Promise<void> {
    const runs = [...this.#runs];
    const orders = await this.#queue.beat(runs.map((run) => run.heartbeat()));
    for (const run of runs) {
      const order = orders.get(run.chunk.id);
      if (order && this.#runs.has(run)) run.obey(order);
    }
    const lost = await this.#queue.reap();
    if (lost > 0) this.#log.warn({ leases: lost }, 'took the leases of a silent worker');
  }
}
