import { parentPort, workerData } from 'node:worker_threads';
import { KernelRefusal, openKernel } from '@nightcone/kernel';
import type { SliceAnswer, SliceThreadData } from './compute-job.ts';

/** One thread: its own instance of the kernel with the job open; computes the slices it is sent. */
const { module, specification, tables } = workerData as SliceThreadData;
const port = parentPort;
if (!port) throw new Error('this file runs as a worker thread');

const answer = (message: SliceAnswer, transfer: ArrayBuffer[] = []) => port.postMessage(message, transfer);

function attempt(work: () => void) {
  try {
    work();
  } catch (error) {
    if (!(error instanceof KernelRefusal)) throw error;
    const { status, code, message } = error;
    answer({ type: 'refused', status, code, message });
  }
}

const kernel = openKernel(module);
attempt(() => {
  kernel.open(specification, tables);
  answer({ type: 'ready' });
});
port.on('message', (slice: number) =>
  attempt(() => {
    const payload = kernel.computeSlice(slice);
    answer({ type: 'slice', slice, payload }, [payload.buffer as ArrayBuffer]);
  }),
);
