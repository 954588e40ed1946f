import { type KernelInstance, KernelRefusal, openKernel } from '@nightcone/kernel';
import type { KernelManifest, Specification } from '@nightcone/models';
import { Refusal } from '../refusal.ts';
import type { PlannedPoint } from './plan-question.ts';

export interface LoadedKernel {
  digest: string;
  manifest: KernelManifest;
  /** Made when first needed: most plans of one evening use one kernel. */
  instance: () => KernelInstance;
}

export function loadKernel(given: { digest: string; manifest: KernelManifest; bytes: Uint8Array }): LoadedKernel {
  let made: KernelInstance | undefined;
  const instance = () => {
    made ??= openKernel(new WebAssembly.Module(new Uint8Array(given.bytes)));
    return made;
  };
  return { digest: given.digest, manifest: given.manifest, instance };
}

/**
 * Opens one point in the kernel itself, which also refuses what no range can say (combinations of parameters). Nothing is
 * computed. A manifest whose slice count differs from the kernel's would bill wrongly: that is an error of ours.
 */
export function probeKernel(kernel: LoadedKernel, specification: Specification, point: PlannedPoint): void {
  // The columns of a table are not here; the worker opens those jobs with them.
  if (specification.tables.length > 0) return;
  const instance = kernel.instance();
  try {
    instance.open(specification);
    const slices = instance.sliceCount();
    if (slices !== point.slices)
      throw new Error(
        `kernel ${kernel.digest} has ${slices} slices for ${point.hash}, its manifest says ${point.slices}`,
      );
  } catch (error) {
    if (!(error instanceof KernelRefusal)) throw error;
    const message = `Point ${point.index}: the kernel refuses it (${error.status}): ${error.message}`;
    throw new Refusal('invalid-specification', message, { errors: [{ field: '/specification', message }] });
  } finally {
    instance.close();
  }
}
