import { openKernel } from '@nightcone/kernel';
import { resultDigest } from '@nightcone/provenance';

/** Runs in a page of the application: computes a complete specification with the kernel that it names. */
export async function computeInBrowser(specification: {
  model: string;
  parameters: object;
  numerics: object;
  kernel: string;
}) {
  const module = await WebAssembly.compileStreaming(fetch(`/api/v1/kernels/${specification.kernel}/module`));
  const kernel = openKernel(module);
  kernel.open(specification);
  const payloads = Array.from({ length: kernel.sliceCount() }, (_, index) => kernel.computeSlice(index));
  return resultDigest(kernel.assemble(payloads));
}
