import type { Chunk, Queue, Task } from '@nightcone/db/queue';
import type { Logger } from 'pino';
import { errorText } from '../../error-text.ts';
import type { ComputeThread } from '../../threads/compute-thread.ts';
import type { ThreadJob } from '../../threads/messages.ts';
import type { WakeSignal } from '../../wake-signal.ts';
import { ChunkRun } from './chunk-run.ts';
import type { ChunkSource } from './chunk-source.ts';

const pollMs = 2000;

export interface SlotOptions {
  queue: Queue;
  source: ChunkSource;
  thread: ComputeThread;
  /** This slot takes only what is quickly done. */
  express: boolean;
  jobOf(task: Task): Promise<ThreadJob>;
  wake: WakeSignal;
  /** Attempts of the whole process that have not ended. */
  runs: Set<ChunkRun>;
  stopping: AbortSignal;
  log: Logger;
}

/** Takes and computes chunks until the worker stops. While one is being recorded the next one is fetched and begun. */
export async function runSlot({
  queue,
  source,
  thread,
  express,
  jobOf,
  wake,
  runs,
  stopping,
  log,
}: SlotOptions): Promise<void> {
  let settling: Promise<void> | undefined;

  async function settle(run: ChunkRun): Promise<void> {
    const { id: chunk, attempt, submissionId: submission } = run.chunk;
    try {
      const crash = await run.settle();
      const times = { cpuMs: Math.round(run.cpuMs), computeMs: Math.round(run.computeMs) };
      const end = { chunk, attempt, submission, tasks: run.finishedTasks, ...times };
      if (crash !== undefined) log.warn({ ...end, reason: crash }, 'chunk crashed');
      else if (run.isLost) log.warn(end, 'chunk was lost to another attempt');
      else log.debug(end, 'chunk ended');
    } catch (error) {
      // The chunk keeps its lease, without heartbeats from now on: it is taken away and tried again like a lost one.
      log.error({ chunk, attempt, submission, reason: errorText(error) }, 'chunk could not be ended');
    } finally {
      runs.delete(run);
      settling = undefined;
    }
    // A person at his cap may go on now, in any slot.
    wake.wake();
  }

  async function compute(chunk: Chunk): Promise<void> {
    const run = new ChunkRun({ chunk, thread, queue, jobOf });
    runs.add(run);
    await run.compute();
    source.release(chunk);
    await settling;
    settling = settle(run);
  }

  async function next(): Promise<Chunk | null> {
    try {
      return await source.next(express);
    } catch (error) {
      log.error({ reason: errorText(error) }, 'no work could be taken');
      return null;
    }
  }

  while (!stopping.aborted) {
    const seen = wake.wakes;
    const chunk = await next();
    if (chunk) await compute(chunk);
    // Its end may free what held the next chunk back, a cap or the assembly of a job.
    else if (settling) await settling;
    else await wake.sleep(seen, pollMs);
  }
  await settling;
}
