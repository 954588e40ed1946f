import { parentPort, threadId, workerData } from 'node:worker_threads';
import { ControlBlock } from '../control-block.ts';
import { serveBatches } from '../serve-batches.ts';
import { openFakeKernel } from './fake-kernel.ts';

if (!parentPort) throw new Error('fake-slice-thread runs in a worker thread only');
serveBatches(parentPort, new ControlBlock(workerData.control), {
  openKernel: openFakeKernel,
  describe: async ({ arrays, certificate }) => ({
    digest: `thread ${threadId}: ${arrays[0]?.bytes.join(' ')}`,
    arrays: arrays.map(({ bytes, ...array }) => ({ ...array, sha256: 'fake', bytes: bytes.length })),
    certificate,
    data: arrays.map(({ bytes }) => bytes),
  }),
});
