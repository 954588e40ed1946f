import { createHash } from 'node:crypto';
import type { Db } from '@nightcone/db';
import { storeKernel } from '@nightcone/db';
import type { Chunk, FinishedResult, Task } from '@nightcone/db/queue';
import { anySlot, startQueue } from '@nightcone/db/testing';
import {
  type KernelInstance,
  KernelRefusal,
  type LoadedKernel,
  loadCurrentKernel,
  openKernel,
} from '@nightcone/kernel/node';
import { resultDigestOf } from '@nightcone/provenance';

/** The kernel that was built last, stored as the current one. */
export async function releaseKernel(db: Db): Promise<LoadedKernel> {
  const kernel = await loadCurrentKernel();
  const { digest, bytes, manifest } = kernel;
  await storeKernel(db, { digest, version: manifest.version, bytes, manifest, current: true });
  return kernel;
}

/** A worker of one slot in this process: computes everything that may start now with the real kernel, then leaves. */
export async function computeAll(databaseUrl: string, kernel: LoadedKernel): Promise<number> {
  const queue = await startQueue(databaseUrl);
  const instance = openKernel(kernel.module);
  let tasks = 0;
  try {
    for (let chunk = await queue.next(anySlot); chunk; chunk = await queue.next(anySlot)) {
      for (const task of chunk.tasks) {
        tasks += 1;
        await queue.record(chunk, [await compute(instance, task, () => queue.payloads(chunk as Chunk, task))]);
      }
      await queue.finish(chunk);
    }
  } finally {
    await queue.stop();
  }
  return tasks;
}

async function compute(instance: KernelInstance, task: Task, recorded: () => Promise<Uint8Array[]>) {
  const { index, kind, specification, sliceFrom, sliceTo } = task;
  const cpuUs = 1000;
  try {
    instance.open(JSON.parse(specification));
    const slices = Array.from({ length: sliceTo - sliceFrom }, (_, i) => instance.computeSlice(sliceFrom + i));
    if (kind === 'part') return { index, cpuUs, outcome: 'payloads' as const, payloads: slices };
    const found = instance.assemble(kind === 'whole' ? slices : await recorded());
    return { index, cpuUs, outcome: 'result' as const, result: await describe(found) };
  } catch (error) {
    if (!(error instanceof KernelRefusal)) throw error;
    return { index, cpuUs, outcome: 'failure' as const, code: error.status, text: error.message };
  } finally {
    instance.close();
  }
}

async function describe({ arrays, certificate }: ReturnType<KernelInstance['assemble']>): Promise<FinishedResult> {
  const described = arrays.map(({ bytes, ...info }) => ({
    ...info,
    sha256: createHash('sha256').update(bytes).digest('hex'),
    bytes: bytes.length,
  }));
  const digest = await resultDigestOf(described, certificate);
  return { digest, arrays: described, certificate, data: arrays.map(({ bytes }) => bytes) };
}
