import { Worker } from 'node:worker_threads';
import { ControlBlock } from './control-block.ts';
import type { Batch, Outcome, ThreadReport, ThreadTask } from './messages.ts';

/** How a batch ended. Outcomes reported before the end count, whatever the end is. */
export type BatchEnd =
  | { kind: 'done' }
  | { kind: 'yielded' }
  | { kind: 'stopped'; reason: string }
  /** The machinery failed; the first task without an outcome was in hand. */
  | { kind: 'crashed'; message: string };

export interface BatchListener {
  outcomes(outcomes: Outcome[]): void;
  /** Share of the task in hand that is done, 0 to 1; at most every 100 ms. */
  progress?(id: number, fraction: number): void;
}

interface Running {
  listener: BatchListener;
  resolve(end: BatchEnd): void;
  stopReason?: string;
  stopTimer?: NodeJS.Timeout;
}

export interface ThreadOptions {
  entry: URL;
  /** A thread that has not left its slice this long after `stop` is terminated. */
  leaveMs?: number;
  /** JavaScript heap of the thread; the memory of kernels and arrays lies outside it. */
  heapMb?: number;
}

/**
 * One slot's thread. It is started when first needed and again after it died. `stop` drops the task in hand: softly
 * if a slice ends at once, else by ending the thread, which WebAssembly cannot delay by more than a few milliseconds.
 */
export class ComputeThread {
  readonly #control = new ControlBlock();
  #worker: Worker | undefined;
  #running: Running | undefined;
  #terminating = false;
  cpuSource: 'thread' | 'wall' | undefined;

  constructor(private readonly options: ThreadOptions) {}

  /** Processor milliseconds of the batch in hand, as of its last finished slice. */
  get cpuMs(): number {
    return this.#control.cpuMs;
  }

  /** Starts the thread before it is needed. */
  prepare(): void {
    this.#started();
  }

  run(tasks: ThreadTask[], listener: BatchListener, { keepsKernel = true } = {}): Promise<BatchEnd> {
    if (this.#running) throw new Error('this thread has a batch in hand');
    this.#control.reset();
    return new Promise((resolve) => {
      this.#running = { listener, resolve };
      this.#started().postMessage({ type: 'batch', tasks, keepsKernel } satisfies Batch, payloadBuffers(tasks));
    });
  }

  /** Ends the batch after the task in hand. */
  yield(): void {
    this.#control.order('yield');
  }

  /** Drops the task in hand and ends the batch with `reason`. */
  stop(reason: string): void {
    const running = this.#running;
    if (!running || running.stopReason !== undefined) return;
    running.stopReason = reason;
    this.#control.order('leave');
    running.stopTimer = setTimeout(() => {
      this.#terminating = true;
      void this.#worker?.terminate();
    }, this.options.leaveMs ?? 100);
  }

  async close(): Promise<void> {
    await this.#worker?.terminate();
  }

  #started(): Worker {
    if (this.#worker) return this.#worker;
    const worker = new Worker(new URL('./boot-thread.mjs', import.meta.url), {
      workerData: { entry: this.options.entry.href, control: this.#control.memory },
      resourceLimits: { maxOldGenerationSizeMb: this.options.heapMb ?? 512 },
      name: 'slices',
    });
    let failure: Error | undefined;
    worker.on('message', (message: ThreadReport) => this.#hear(message));
    worker.on('error', (error) => {
      failure = error;
    });
    worker.on('exit', (code) => {
      this.#worker = undefined;
      this.#terminating = false;
      this.#end((running) =>
        running.stopReason !== undefined
          ? { kind: 'stopped', reason: running.stopReason }
          : {
              kind: 'crashed',
              message: failure ? `the thread failed: ${failure.message}` : `the thread ended with code ${code}`,
            },
      );
    });
    this.#worker = worker;
    return worker;
  }

  #hear(message: ThreadReport): void {
    const running = this.#running;
    if (message.type === 'ready') this.cpuSource = message.cpuSource;
    else if (message.type === 'progress') running?.listener.progress?.(message.id, message.fraction);
    else if (message.type === 'outcomes') running?.listener.outcomes(message.outcomes);
    // Of a thread that is being ended, only its exit counts: the next batch needs a new one.
    else if (this.#terminating) return;
    else if (message.type === 'trapped') {
      this.#end(() => ({ kind: 'crashed', message: `the kernel failed: ${message.message}` }));
    } else {
      this.#end(({ stopReason }) =>
        stopReason !== undefined
          ? { kind: 'stopped', reason: stopReason }
          : { kind: message.yielded ? 'yielded' : 'done' },
      );
    }
  }

  #end(how: (running: Running) => BatchEnd): void {
    const running = this.#running;
    if (!running) return;
    clearTimeout(running.stopTimer);
    this.#running = undefined;
    running.resolve(how(running));
  }
}

/** Payloads of an assembly are handed over where they own their buffer, and copied where they share one. */
function payloadBuffers(tasks: ThreadTask[]): ArrayBuffer[] {
  const payloads = tasks.flatMap((task) => (task.kind === 'assembly' ? task.payloads : []));
  return [
    ...new Set(payloads.map(({ buffer, byteLength }) => (buffer.byteLength === byteLength ? buffer : undefined))),
  ].filter((buffer) => buffer instanceof ArrayBuffer);
}
