import { type KernelInstance, KernelRefusal, type KernelResult } from '@nightcone/kernel';
import type { AssembledResult, Outcome, ThreadTask } from './messages.ts';

export type TaskResult = Outcome extends infer O ? (O extends Outcome ? Omit<O, 'id' | 'cpuMs'> : never) : never;

export interface TaskSteps {
  /** The kernel with the task's job open. Throws KernelRefusal. */
  open(): KernelInstance;
  describe(result: KernelResult): Promise<AssembledResult>;
  /** Called after every slice. */
  afterSlice(done: number, total: number): void;
}

/**
 * Carries out one task. A KernelRefusal becomes its result; every other error, a failure of the machinery or an order
 * to leave, passes through.
 */
export async function computeTask(task: ThreadTask, steps: TaskSteps): Promise<TaskResult> {
  try {
    const kernel = steps.open();
    if (task.kind === 'assembly') return await assemble(kernel, task.payloads, steps);
    const from = task.kind === 'part' ? task.from : 0;
    const to = task.kind === 'part' ? task.to : kernel.sliceCount();
    const payloads: Uint8Array[] = [];
    for (let slice = from; slice < to; slice++) {
      payloads.push(kernel.computeSlice(slice));
      steps.afterSlice(slice + 1 - from, to - from);
    }
    return task.kind === 'part' ? { status: 'computed', payloads } : await assemble(kernel, payloads, steps);
  } catch (error) {
    if (!(error instanceof KernelRefusal)) throw error;
    return { status: 'refused', code: error.status, diagnostic: error.message };
  }
}

async function assemble(kernel: KernelInstance, payloads: Uint8Array[], steps: TaskSteps): Promise<TaskResult> {
  return { status: 'assembled', result: await steps.describe(kernel.assemble(payloads)) };
}
