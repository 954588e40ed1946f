import { createHash } from 'node:crypto';
import { type Db, type PlannedJob, type Submitter, storeKernel } from '@nightcone/db';
import { type FakeParameters, fakeKernelBytes, fakeManifest } from '../threads/testing/fake-kernel.ts';
import { submitPlanned } from './planned-sweep.ts';

const sha256 = (data: string | Uint8Array) => createHash('sha256').update(data).digest('hex');
export const fakeKernelDigest = sha256(fakeKernelBytes);

/** The kernel of the fake slice thread; not the current one, so that a worker's speed counts as 1. */
export function storeFakeKernel(db: Db): Promise<void> {
  const { version } = fakeManifest;
  return storeKernel(db, {
    digest: fakeKernelDigest,
    version,
    bytes: fakeKernelBytes,
    manifest: fakeManifest,
    current: false,
  });
}

let made = 0;

/** A sweep of jobs for the fake slice thread, all different. The id of its submission. */
export function submitFakeSweep(
  db: Db,
  submitter: Submitter,
  jobs: FakeParameters[],
  estimatedMs = 100,
): Promise<string> {
  const planned = jobs.map((parameters): PlannedJob => {
    const specification = {
      kernel: fakeKernelDigest,
      model: 'fake',
      numerics: { number: made++ },
      parameters,
      tables: [],
    };
    const canonicalText = JSON.stringify(specification);
    return {
      hash: sha256(canonicalText),
      canonicalText,
      model: 'fake',
      kernelDigest: fakeKernelDigest,
      questionDigest: null,
      tables: [],
      estimatedMs,
      slices: parameters.slices,
      resultBytes: 100,
      memoryBytes: 1_000_000,
    };
  });
  return submitPlanned(db, submitter, planned);
}
