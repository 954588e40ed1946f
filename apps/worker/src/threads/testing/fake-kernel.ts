import { addCustomSection, type KernelInstance, KernelRefusal, MANIFEST_SECTION } from '@nightcone/kernel';
import type { KernelManifest } from '@nightcone/models';

/** `spin`, the only function of this WebAssembly module, never returns. */
const spin = Uint8Array.from([
  0x00, 0x61, 0x73, 0x6d, 0x01, 0x00, 0x00, 0x00, 0x01, 0x04, 0x01, 0x60, 0x00, 0x00, 0x03, 0x02, 0x01, 0x00, 0x07,
  0x08, 0x01, 0x04, 0x73, 0x70, 0x69, 0x6e, 0x00, 0x00, 0x0a, 0x09, 0x01, 0x07, 0x00, 0x03, 0x40, 0x0c, 0x00, 0x0b,
  0x0b,
]);
export const fakeManifest: KernelManifest = { interface: 1, version: '0.0.0-fake', models: [] };

/** As it is stored: the module with an empty manifest. */
export const fakeKernelBytes = addCustomSection(
  spin,
  MANIFEST_SECTION,
  new TextEncoder().encode(JSON.stringify(fakeManifest)),
);
export const spinningModule = new WebAssembly.Module(spin);

export type Act = 'compute' | 'spin' | 'trap' | 'refuse' | 'exit' | 'exhaust' | 'work-20-ms';
export interface FakeParameters {
  slices: number;
  /** What slice i does; `compute` beyond the list. */
  acts?: Act[];
}

let instances = 0;

/**
 * Payload of slice i: i, the number of jobs opened so far in this instance, the number of instances so far in this
 * thread. The result is all payloads in a row.
 */
export function openFakeKernel(module: WebAssembly.Module): KernelInstance {
  let job: FakeParameters | undefined;
  let opened = 0;
  const instance = ++instances;
  const act = (name: Act, i: number): Uint8Array => {
    if (name === 'spin') (new WebAssembly.Instance(module).exports.spin as () => void)();
    if (name === 'trap') throw new WebAssembly.RuntimeError('unreachable');
    if (name === 'refuse') throw new KernelRefusal('not-converged', 3, `slice ${i} did not converge`);
    if (name === 'exit') process.exit(7);
    if (name === 'exhaust') for (const rows: string[][] = []; ; ) rows.push(new Array(1e6).fill(`${rows.length}`));
    if (name === 'work-20-ms') for (const end = performance.now() + 20; performance.now() < end; );
    return Uint8Array.of(i, opened, instance);
  };
  return {
    manifest: fakeManifest,
    open({ parameters }) {
      job = parameters as FakeParameters;
      opened++;
    },
    sliceCount: () => job?.slices ?? 0,
    sliceCost: () => 1,
    assembleCost: () => 1,
    computeSlice: (i) => act(job?.acts?.[i] ?? 'compute', i),
    assemble(payloads) {
      const bytes = Uint8Array.from(payloads.flatMap((payload) => [...payload]));
      return {
        arrays: [{ name: 'bytes', dtype: 'u8', shape: [bytes.length], dims: ['byte'], unit: '', bytes }],
        certificate: { numbers: {}, checks: [] },
      };
    },
    close: () => {
      job = undefined;
    },
  };
}
