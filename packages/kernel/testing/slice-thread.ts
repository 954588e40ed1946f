import { parentPort, workerData } from 'node:worker_threads';
import { goldenJobs } from '../src/golden/index.ts';
import { openKernel } from '../src/index.ts';
import { openGolden } from './fingerprint.ts';

/** Computes every `threads`-th slice of every golden job in a thread of its own, with its own memory. */
const { module, thread, threads } = workerData as { module: WebAssembly.Module; thread: number; threads: number };
const kernel = openKernel(module);
const payloads: { [name: string]: [number, Uint8Array][] } = {};
for (const job of goldenJobs) {
  openGolden(kernel, job);
  const mine: [number, Uint8Array][] = [];
  for (let slice = thread; slice < kernel.sliceCount(); slice += threads)
    mine.push([slice, kernel.computeSlice(slice)]);
  payloads[job.name] = mine;
}
parentPort?.postMessage(payloads);
