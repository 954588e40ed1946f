import { type KernelInstance, KernelRefusal } from '@nightcone/kernel';

/** A WebAssembly module whose only function, `spin`, never returns. */
export const spinningModule = new WebAssembly.Module(
  Uint8Array.from([
    0x00, 0x61, 0x73, 0x6d, 0x01, 0x00, 0x00, 0x00, 0x01, 0x04, 0x01, 0x60, 0x00, 0x00, 0x03, 0x02, 0x01, 0x00, 0x07,
    0x08, 0x01, 0x04, 0x73, 0x70, 0x69, 0x6e, 0x00, 0x00, 0x0a, 0x09, 0x01, 0x07, 0x00, 0x03, 0x40, 0x0c, 0x00, 0x0b,
    0x0b,
  ]),
);

export type Act = 'compute' | 'spin' | 'trap' | 'refuse' | 'exit' | 'exhaust' | 'work-20-ms';
export interface FakeParameters {
  slices: number;
  /** What slice i does; `compute` beyond the list. */
  acts?: Act[];
}

/** Payload of slice i: the byte i and how many jobs were opened before it; the result is all payloads in a row. */
export function openFakeKernel(module: WebAssembly.Module): KernelInstance {
  let job: FakeParameters | undefined;
  let opened = 0;
  const act = (name: Act, i: number): Uint8Array => {
    if (name === 'spin') (new WebAssembly.Instance(module).exports.spin as () => void)();
    if (name === 'trap') throw new WebAssembly.RuntimeError('unreachable');
    if (name === 'refuse') throw new KernelRefusal('not-converged', 3, `slice ${i} did not converge`);
    if (name === 'exit') process.exit(7);
    if (name === 'exhaust') for (const rows: string[][] = []; ; ) rows.push(new Array(1e6).fill(`${rows.length}`));
    if (name === 'work-20-ms') for (const end = performance.now() + 20; performance.now() < end; );
    return Uint8Array.of(i, opened);
  };
  return {
    manifest: { interface: 1, version: 'fake', models: [] },
    open({ parameters }) {
      job = parameters as FakeParameters;
      opened++;
    },
    sliceCount: () => job?.slices ?? 0,
    sliceCost: () => 1,
    assembleCost: () => 1,
    computeSlice: (i) => act(job?.acts?.[i] ?? 'compute', i),
    assemble: (payloads) => ({
      arrays: [
        {
          name: 'bytes',
          dtype: 'u8',
          shape: [],
          dims: [],
          unit: '',
          bytes: Uint8Array.from(payloads.flatMap((p) => [...p])),
        },
      ],
      certificate: { numbers: {}, checks: [] },
    }),
    close: () => {
      job = undefined;
    },
  };
}
