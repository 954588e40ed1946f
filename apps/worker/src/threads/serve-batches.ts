import { setPriority } from 'node:os';
import type { MessagePort } from 'node:worker_threads';
import type { KernelInstance, KernelResult } from '@nightcone/kernel';
import { computeTask } from './compute-task.ts';
import type { ControlBlock } from './control-block.ts';
import { openCpuClock } from './cpu-clock.ts';
import { KernelShelf } from './kernel-shelf.ts';
import type { Batch, Task, ThreadReport } from './messages.ts';
import { Outbox } from './outbox.ts';

export interface KernelHost {
  instantiate(module: WebAssembly.Module): KernelInstance | Promise<KernelInstance>;
  digest(result: KernelResult): string | Promise<string>;
}

const progressEveryMs = 100;

/** The whole life of a slice thread: takes batches from the port, computes them in order, reports. */
export function serveBatches(port: MessagePort, control: ControlBlock, host: KernelHost): void {
  lowerPriority();
  const clock = openCpuClock();
  let reportedAt = 0;
  const shelf = new KernelShelf(host.instantiate);
  const report = (message: ThreadReport) => port.postMessage(message);

  async function serve(batch: Batch): Promise<void> {
    for (const [digest, module] of batch.modules) shelf.addModule(digest, module);
    const startMs = clock.readMs();
    const outbox = new Outbox(port, clock);
    for (const task of batch.tasks) {
      if (control.mustYield) return end(outbox, true);
      try {
        if (!(await compute(task, outbox, startMs))) return end(outbox, true);
      } catch (error) {
        shelf.discard(task.job.kernel);
        outbox.post();
        return report({
          type: 'trapped',
          id: task.id,
          message: error instanceof Error ? error.message : String(error),
        });
      }
    }
    end(outbox, false);
  }

  async function compute(task: Task, outbox: Outbox, startMs: number): Promise<boolean> {
    const outcome = await computeTask(task, {
      open: () => shelf.open(task.job),
      digest: host.digest,
      afterSlice(done, total) {
        control.cpuMs = clock.readMs() - startMs;
        const now = performance.now();
        if (now - reportedAt >= progressEveryMs && done < total) {
          reportedAt = now;
          report({ type: 'progress', id: task.id, done, total });
        }
        return !control.mustLeave;
      },
    });
    if (outcome) outbox.add({ ...outcome, id: task.id });
    control.cpuMs = clock.readMs() - startMs;
    return outcome !== undefined;
  }

  function end(outbox: Outbox, yielded: boolean): void {
    outbox.post();
    report({ type: 'end', yielded });
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
