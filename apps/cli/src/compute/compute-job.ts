import { Worker } from 'node:worker_threads';
import {
  KernelCrash,
  type KernelInstance,
  KernelRefusal,
  type KernelResult,
  openKernel,
  type Tables,
} from '@nightcone/kernel';
import type { Specification } from '@nightcone/models';

export interface SliceThreadData {
  module: WebAssembly.Module;
  specification: Specification;
  tables: Tables | undefined;
}
export type SliceAnswer =
  | { type: 'ready' }
  | { type: 'slice'; slice: number; payload: Uint8Array }
  | { type: 'refused'; status: string; code: number; message: string };

export interface ComputeOptions {
  tables?: Tables;
  /** Undefined: as many as pay for their start. */
  threads?: number;
  /** Most threads where `threads` leaves it open. */
  available?: number;
  onProgress?: (done: number, total: number) => void;
}

/** Starting a thread takes about 0.3 s, in calibrated operations: less work than this is done here and now. */
const worthAThread = 3e8;

/**
 * Computes a job: every slice, on this thread or several, then the assembly. The number of threads and the order of
 * slices change no bit. Throws KernelRefusal, KernelCrash.
 */
export async function computeJob(
  module: WebAssembly.Module,
  specification: Specification,
  options: ComputeOptions = {},
): Promise<KernelResult> {
  const kernel = openKernel(module);
  kernel.open(specification, options.tables);
  const total = kernel.sliceCount();
  const payloads = new Array<Uint8Array>(total);
  let done = 0;
  const keep = (slice: number, payload: Uint8Array) => {
    payloads[slice] = payload;
    done += 1;
    options.onProgress?.(done, total);
  };
  const threads = threadCount(kernel, total, options);
  if (threads <= 1) for (let slice = 0; slice < total; slice++) keep(slice, kernel.computeSlice(slice));
  else await computeOnThreads(threads, { module, specification, tables: options.tables }, total, keep);
  const result = kernel.assemble(payloads);
  kernel.close();
  return result;
}

function threadCount(kernel: KernelInstance, slices: number, { threads, available = 1 }: ComputeOptions): number {
  if (threads !== undefined) return Math.min(threads, slices);
  let operations = 0;
  for (let slice = 0; slice < slices; slice++) operations += kernel.sliceCost(slice);
  return operations < 2 * worthAThread ? 1 : Math.min(available, slices, Math.floor(operations / worthAThread));
}

/** Hands slices to threads one by one, in order, so that none waits for a slow one. Ends all threads in any case. */
async function computeOnThreads(
  count: number,
  data: SliceThreadData,
  total: number,
  keep: (slice: number, payload: Uint8Array) => void,
): Promise<void> {
  const entry = new URL('./slice-thread.ts', import.meta.url).href;
  const boot = new URL('./boot-thread.mjs', import.meta.url);
  const threads = Array.from({ length: count }, () => new Worker(boot, { workerData: { ...data, entry } }));
  let next = 0;
  try {
    await Promise.all(
      threads.map(
        (thread) =>
          new Promise<void>((resolve, reject) => {
            thread.on('message', (answer: SliceAnswer) => {
              if (answer.type === 'refused')
                return reject(new KernelRefusal(answer.status, answer.code, answer.message));
              if (answer.type === 'slice') keep(answer.slice, answer.payload);
              if (next < total) thread.postMessage(next++);
              else resolve();
            });
            thread.on('error', (error) => reject(new KernelCrash(`A thread failed: ${error.message}`)));
            thread.on('exit', () => reject(new KernelCrash('A thread ended before its slice was done.')));
          }),
      ),
    );
  } finally {
    await Promise.all(threads.map((thread) => thread.terminate()));
  }
}
