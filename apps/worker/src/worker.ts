import { heartbeatMs, Queue, type QueueMessage } from '@nightcone/db/queue';
import type { Logger } from 'pino';
import { Database } from './database.ts';
import { errorText } from './error-text.ts';
import { KernelStore } from './features/kernels/kernel-store.ts';
import type { ChunkRun } from './features/queue/chunk-run.ts';
import { ChunkSource } from './features/queue/chunk-source.ts';
import { runSlot } from './features/queue/run-slot.ts';
import { TableStore } from './features/tables/table-store.ts';
import { describeWorker } from './features/workers/describe-worker.ts';
import { measureSpeed } from './features/workers/measure-speed.ts';
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
  readonly #slotCount: number;
  readonly #databaseUrl: string;
  readonly #threads: ThreadPool;
  readonly #database: Database;
  readonly #kernels: KernelStore;
  readonly #loadedKernels = new Set<string>();
  readonly #wake = new WakeSignal();
  readonly #runs = new Set<ChunkRun>();
  readonly #stopping = new AbortController();
  #queue: Queue | undefined;
  #slots: Promise<void>[] = [];
  #timer: NodeJS.Timeout | undefined;
  #left = false;
  #stopped: Promise<void> | undefined;

  constructor({ databaseUrl, slots, log, threadEntry }: WorkerOptions) {
    this.#databaseUrl = databaseUrl;
    this.#slotCount = slots;
    this.#log = log;
    this.#threads = new ThreadPool({ size: slots, entry: threadEntry });
    this.#database = new Database(databaseUrl, this.#onDatabaseError);
    this.#kernels = new KernelStore(
      (digest) => this.#database.kernelBytes(digest),
      (digest) => {
        this.#loadedKernels.add(digest);
        this.#tellKernels();
      },
    );
  }

  async start(): Promise<void> {
    try {
      await this.#join();
    } catch (error) {
      // A stop ends whatever the start was waiting for.
      if (!this.#stopping.signal.aborted) throw error;
    }
  }

  async #join(): Promise<void> {
    const worker = describeWorker(this.#slotCount, await this.#measureSpeed());
    if (this.#stopping.signal.aborted) return;
    const queue = new Queue({ connectionString: this.#databaseUrl, worker, onError: this.#onDatabaseError });
    this.#queue = queue;
    await queue.start();
    this.#tellKernels();
    queue.listen((message) => this.#hear(message));
    const tables = new TableStore((digest) => this.#database.table(digest));
    const jobOf = jobInputs(this.#kernels, tables);
    const source = new ChunkSource(queue);
    for (const thread of this.#threads.threads) thread.prepare();
    this.#slots = this.#threads.threads.map((thread, number) =>
      runSlot({
        queue,
        source,
        thread,
        // One slot of several is kept for what is quickly done, so that long parts never fill everything.
        express: number === 1,
        jobOf,
        wake: this.#wake,
        runs: this.#runs,
        stopping: this.#stopping.signal,
        log: this.#log,
      }),
    );
    this.#beatLater(queue);
    const { id, slots, memoryBytes, speedFactor } = worker;
    this.#log.info({ worker: id, slots, memoryBytes, speedFactor }, 'worker joined');
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
    this.#left = true;
    clearTimeout(this.#timer);
    await this.#threads.close();
    await this.#queue?.stop();
    await this.#database.close();
    this.#log.info('worker left');
  }

  readonly #onDatabaseError = (error: Error): void => {
    this.#log.warn({ reason: errorText(error) }, 'trouble with the database');
  };

  #tellKernels(): void {
    if (this.#loadedKernels.size > 0) this.#queue?.noteKernels([...this.#loadedKernels]).catch(this.#onDatabaseError);
  }

  async #measureSpeed(): Promise<number> {
    const digest = await this.#database.currentKernel();
    const thread = this.#threads.threads[0];
    if (digest === undefined || !thread) return 1;
    try {
      return await measureSpeed(await this.#kernels.load(digest), thread);
    } catch (error) {
      this.#log.warn({ reason: errorText(error) }, 'the speed of this machine could not be measured');
      return 1;
    }
  }

  #hear({ topic, id }: QueueMessage): void {
    if (topic === 'work' || topic === 'connected') this.#wake.wake();
    if (topic !== 'cancel' && topic !== 'pause') return;
    for (const run of this.#runs) {
      if (run.chunk.submissionId === id) run.obey(topic === 'cancel' ? 'cancel' : 'yield');
    }
  }

  #beatLater(queue: Queue): void {
    this.#timer = setTimeout(async () => {
      try {
        await this.#beat(queue);
      } catch (error) {
        this.#log.error({ reason: errorText(error) }, 'heartbeat failed');
      }
      if (!this.#left) this.#beatLater(queue);
    }, heartbeatMs);
  }

  /** Signs of life and orders for all running chunks; then the leases of workers that gave none are taken away. */
  async #beat(queue: Queue): Promise<void> {
    const runs = [...this.#runs];
    const orders = await queue.beat(runs.map((run) => run.heartbeat()));
    for (const run of runs) {
      const order = orders.get(run.chunk.id);
      if (order && this.#runs.has(run)) run.obey(order);
    }
    const lost = await queue.reap();
    if (lost > 0) this.#log.warn({ leases: lost }, 'took the leases of a silent worker');
  }
}
