import { parentPort, threadId, workerData } from 'node:worker_threads';
import { ControlBlock } from '../control-block.ts';
import { serveBatches } from '../serve-batches.ts';
import { openFakeKernel } from './fake-kernel.ts';

if (!parentPort) throw new Error('fake-slice-thread runs in a worker thread only');
serveBatches(parentPort, new ControlBlock(workerData.control), {
  openKernel: openFakeKernel,
  digest: (result) => `thread ${threadId}: ${result.arrays[0]?.bytes.join(' ')}`,
});
