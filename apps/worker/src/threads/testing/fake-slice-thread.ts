import { parentPort, workerData } from 'node:worker_threads';
import { ControlBlock } from '../control-block.ts';
import { describeResult } from '../describe-result.ts';
import { serveBatches } from '../serve-batches.ts';
import { openFakeKernel } from './fake-kernel.ts';

if (!parentPort) throw new Error('fake-slice-thread runs in a worker thread only');
serveBatches(parentPort, new ControlBlock(workerData.control), {
  openKernel: openFakeKernel,
  describe: describeResult,
});
