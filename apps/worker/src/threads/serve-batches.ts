import { setPriority } from 'node:os';
import type { MessagePort } from 'node:worker_threads';
import type { KernelInstance, KernelResult } from '@nightcone/kernel';
import { errorText } from '../error-text.ts';
import { computeTask } from './compute-task.ts';
import type { ControlBlock } from './control-block.ts';
import { openCpuClock } from './cpu-clock.ts';
import { KernelShelf } from './kernel-shelf.ts';
import type { AssembledResult, Batch, ThreadReport, ThreadTask } from './messages.ts';
import { Outbox } from './outbox.ts';

export interface KernelHost {
  /** `onProgress` is called from inside running slices and assemblies; what it throws ends them. */
  openKernel(module: WebAssembly.Module, onProgress: (done: number, total: number) => void): KernelInstance;
  describe(result: KernelResult): Promise<AssembledResult>;
}

/** Thrown through the kernel when the order is to leave the task in hand. */
class TaskLeft extends Error {
  override name = 'TaskLeft';
}

const progressEveryMs = 100;

/** The whole life of a slice thread: takes batches from the port, computes them in order, reports. */
export function serveBatches(port: MessagePort, control: ControlBlock, host: KernelHost): void {
  lowerPriority();
  const clock = openCpuClock();
  const shelf = new KernelShelf((module) => host.openKernel(module, insideSlice));
  const report = (message: ThreadReport) => port.postMessage(message);
  let reportedAt = 0;
  let startCpuMs = 0;
  let outbox: Outbox | undefined;
  let task: ThreadTask | undefined;
  let slices = { done: 0, total: 1 };

  function insideSlice(done: number, total: number): void {
    if (control.mustLeave) throw new TaskLeft();
    const now = performance.now();
    if (now - reportedAt < progressEveryMs || !task) return;
    reportedAt = now;
    outbox?.postIfDue();
    control.cpuMs = clock.readMs() - startCpuMs;
    const inSlice = total > 0 ? Math.min(1, done / total) : 0;
    report({ type: 'progress', id: task.id, fraction: Math.min(1, (slices.done + inSlice) / slices.total) });
  }

  async function compute(next: ThreadTask): Promise<void> {
    task = next;
    slices = { done: 0, total: 1 };
    const result = await computeTask(next, {
      open: () => shelf.open(next.job),
      describe: host.describe,
      afterSlice(done, total) {
        slices = { done, total };
        insideSlice(0, 1);
      },
    });
    outbox?.add({ ...result, id: next.id });
    control.cpuMs = clock.readMs() - startCpuMs;
  }

  async function serve(batch: Batch): Promise<void> {
    startCpuMs = clock.readMs();
    outbox = new Outbox(port, clock);
    const end = (message: ThreadReport) => {
      if (!batch.keepsKernel) for (const { job } of batch.tasks) shelf.discard(job.kernel);
      outbox?.post();
      report(message);
    };
    for (const next of batch.tasks) {
      if (control.mustYield) return end({ type: 'end', yielded: true });
      try {
        await compute(next);
      } catch (error) {
        // Nothing is known of the instance's memory after a trap or an abandoned slice.
        shelf.discard(next.job.kernel);
        if (error instanceof TaskLeft) return end({ type: 'end', yielded: true });
        return end({ type: 'trapped', message: errorText(error) });
      }
    }
    end({ type: 'end', yielded: false });
  }

  port.on('message', (batch: Batch) => void serve(batch));
  report({ type: 'ready', cpuSource: clock.source });
}

/** Below the worker process itself, so that heartbeats never wait for computation. 0 is the calling thread on Linux. */
function lowerPriority(): void {
  if (process.platform !== 'linux') return;
  try {
    setPriority(0, 10);
  } catch {
    // Refused where the process is already at a lower priority: nothing is lost.
  }
}
