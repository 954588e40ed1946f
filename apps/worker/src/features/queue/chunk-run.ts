import type { Chunk, Heartbeat, Order, PartRecord, Queue, Task } from '@nightcone/db/queue';
import { errorText } from '../../error-text.ts';
import type { BatchEnd, ComputeThread } from '../../threads/compute-thread.ts';
import type { Outcome, ThreadJob, ThreadTask } from '../../threads/messages.ts';
import { Recorder } from './recorder.ts';

/** A kernel that may have grown beyond this is not kept for the next chunk. */
const keptKernelBytes = 256 * 2 ** 20;

export interface ChunkRunOptions {
  chunk: Chunk;
  thread: ComputeThread;
  queue: Pick<Queue, 'record' | 'payloads' | 'finish' | 'crash' | 'worker'>;
  /** Loads what a job needs: its kernel and tables. */
  jobOf(task: Task): Promise<ThreadJob>;
}

/** One attempt at one chunk: computes its tasks in order, records what is finished, obeys orders, and ends the attempt. */
export class ChunkRun {
  readonly #recorder: Recorder;
  #order: Order = 'go';
  #stopped = false;
  #failure: string | undefined;
  #computing = true;
  #ending = false;
  /** Processor time of the batches before the one in hand. */
  #earlierCpuMs = 0;
  #recordedCpuMs = 0;
  #computeMs = 0;
  #finishedTasks = 0;
  #taskFraction = 0;

  constructor(private readonly options: ChunkRunOptions) {
    this.#recorder = new Recorder({
      write: (records) => options.queue.record(options.chunk, records),
      onOrder: (order) => this.obey(order),
      onFailure: (error) => this.#fail(`results could not be recorded: ${errorText(error)}`),
    });
  }

  get chunk(): Chunk {
    return this.options.chunk;
  }

  get cpuMs(): number {
    return this.#earlierCpuMs + (this.#computing ? this.options.thread.cpuMs : 0);
  }

  /** Elapsed time for which the thread has worked on this chunk. */
  get computeMs(): number {
    return this.#computeMs;
  }

  get finishedTasks(): number {
    return this.#finishedTasks;
  }

  /** Somebody else has this chunk now: nothing of this attempt is written any more. */
  get isLost(): boolean {
    return this.#order === 'lost';
  }

  heartbeat(): Heartbeat {
    const fraction = (this.#finishedTasks + this.#taskFraction) / this.chunk.tasks.length;
    return { chunk: this.chunk, cpuUs: Math.round(this.cpuMs * 1000), fraction: Math.min(1, fraction) };
  }

  /** `yield` lets the task in hand end; `cancel` and `lost` do not. */
  obey(order: Order): void {
    // Once the attempt is being ended its lease is gone by rights, and the thread may be at the next chunk.
    if (order === 'go' || this.#ending || this.#order === 'lost') return;
    if (order === 'yield' && this.#order === 'cancel') return;
    this.#order = order;
    if (order !== 'yield') this.stop(order);
    else if (this.#computing) this.options.thread.yield();
  }

  /** Drops the task in hand. What was finished is still recorded. */
  stop(reason: string): void {
    this.#stopped = true;
    if (this.#computing) this.options.thread.stop(reason);
  }

  /** Resolves when the thread is free again; records may still be on their way. */
  async compute(): Promise<void> {
    try {
      for (const batch of batches(this.chunk.tasks)) {
        const tasks = await this.#prepare(batch);
        if (this.#order !== 'go' || this.#stopped) break;
        const listener = {
          outcomes: (outcomes: Outcome[]) => this.#hear(outcomes),
          progress: (_task: number, fraction: number) => {
            this.#taskFraction = fraction;
            this.#keepBudget();
          },
        };
        const keepsKernel = this.chunk.memoryBytes <= keptKernelBytes;
        const startedAt = performance.now();
        const end = await this.options.thread.run(tasks, listener, { keepsKernel });
        this.#computeMs += performance.now() - startedAt;
        this.#earlierCpuMs += this.options.thread.cpuMs;
        if (end.kind !== 'done') {
          this.#note(end);
          break;
        }
      }
    } catch (error) {
      this.#fail(errorText(error));
    } finally {
      this.#computing = false;
    }
  }

  /** Records the rest and ends the attempt; the reason of a crash, if it was one. */
  async settle(): Promise<string | undefined> {
    await this.#recorder.drain();
    if (this.isLost) return undefined;
    this.#ending = true;
    if (this.#failure === undefined) {
      if (!(await this.options.queue.finish(this.chunk))) this.#order = 'lost';
      return undefined;
    }
    const lostUs = Math.max(0, Math.round((this.#earlierCpuMs - this.#recordedCpuMs) * 1000));
    await this.options.queue.crash(this.chunk, this.#failure, lostUs);
    return this.#failure;
  }

  async #prepare(tasks: Task[]): Promise<ThreadTask[]> {
    const prepared: ThreadTask[] = [];
    for (const task of tasks) {
      const job = await this.options.jobOf(task);
      const id = task.index;
      if (task.kind === 'whole') prepared.push({ id, job, kind: 'whole' });
      else if (task.kind === 'part') prepared.push({ id, job, kind: 'part', from: task.sliceFrom, to: task.sliceTo });
      else prepared.push({ id, job, kind: 'assembly', payloads: await this.options.queue.payloads(this.chunk, task) });
    }
    return prepared;
  }

  #hear(outcomes: Outcome[]): void {
    this.#finishedTasks += outcomes.length;
    this.#taskFraction = 0;
    for (const { cpuMs } of outcomes) this.#recordedCpuMs += cpuMs;
    this.#recorder.add(outcomes.map(partRecord));
    this.#keepBudget();
  }

  /** An estimate that was far too small must cost others one budget, not a whole chunk. */
  #keepBudget(): void {
    const referenceMs = this.cpuMs * this.options.queue.worker.speedFactor;
    if (referenceMs > this.chunk.budgetMs) this.obey('yield');
  }

  #note(end: BatchEnd): void {
    if (end.kind === 'crashed') this.#fail(end.message);
  }

  #fail(reason: string): void {
    this.#failure ??= reason;
    this.stop(reason);
  }
}

/** Tasks that travel to the thread together. An assembly travels alone: its payloads may be large. */
function batches(tasks: Task[]): Task[][] {
  const all: Task[][] = [];
  for (const task of tasks) {
    const last = all.at(-1);
    if (!last || task.kind === 'assembly' || last[0]?.kind === 'assembly') all.push([task]);
    else last.push(task);
  }
  return all;
}

function partRecord(outcome: Outcome): PartRecord {
  const part = { index: outcome.id, cpuUs: Math.max(0, Math.round(outcome.cpuMs * 1000)) };
  if (outcome.status === 'computed') return { ...part, outcome: 'payloads', payloads: outcome.payloads };
  if (outcome.status === 'assembled') return { ...part, outcome: 'result', result: outcome.result };
  return { ...part, outcome: 'failure', code: outcome.code, text: outcome.diagnostic };
}
