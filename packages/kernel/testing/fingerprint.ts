import { createHash } from 'node:crypto';
import { type GoldenJob, goldenTables } from '../src/golden/index.ts';
import type { KernelInstance, KernelResult } from '../src/index.ts';
import { complete } from './run-job.ts';

/** Opens a golden job in an instance. */
export function openGolden(kernel: KernelInstance, job: GoldenJob): void {
  const { model, parameters, numerics } = job;
  kernel.open(complete(kernel.manifest, { model, parameters, numerics }), goldenTables(job));
}

/** SHA-256 over all bytes that a job makes: payloads in slice order, arrays, certificate. */
export function fingerprint(payloads: readonly Uint8Array[], result: KernelResult): string {
  const hash = createHash('sha256');
  for (const payload of payloads) hash.update(payload);
  for (const array of result.arrays) hash.update(array.name).update(array.bytes);
  return hash.update(JSON.stringify(result.certificate)).digest('hex');
}

/** Computes a golden job in one instance, slices in the given order, and takes its fingerprint. */
export function goldenFingerprint(kernel: KernelInstance, job: GoldenJob, backwards = false): string {
  openGolden(kernel, job);
  const count = kernel.sliceCount();
  const payloads: Uint8Array[] = [];
  for (let i = 0; i < count; i++) {
    const slice = backwards ? count - 1 - i : i;
    payloads[slice] = kernel.computeSlice(slice);
  }
  return fingerprint(payloads, kernel.assemble(payloads));
}
