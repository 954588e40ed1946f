import { parentPort, workerData } from 'node:worker_threads';
import { openKernel } from '@nightcone/kernel/node';
import { ControlBlock } from './control-block.ts';
import { describeResult } from './describe-result.ts';
import { serveBatches } from './serve-batches.ts';

if (!parentPort) throw new Error('slice-thread runs in a worker thread only');
serveBatches(parentPort, new ControlBlock(workerData.control), {
  openKernel: (module, onProgress) => openKernel(module, { onProgress }),
  describe: describeResult,
});
