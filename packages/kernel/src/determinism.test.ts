import { execFile } from 'node:child_process';
import { fileURLToPath } from 'node:url';
import { promisify } from 'node:util';
import { Worker } from 'node:worker_threads';
import { afterEach, beforeAll, describe, expect, it } from 'vitest';
import { fingerprint, goldenFingerprint, openGolden } from '../testing/fingerprint.ts';
import { goldenJobs } from './golden/index.ts';
import { type KernelInstance, loadCurrentKernel, openKernel } from './node.ts';

let module: WebAssembly.Module;
let kernel: KernelInstance;
const undisturbed: { [name: string]: string } = {};
beforeAll(async () => {
  ({ module } = await loadCurrentKernel());
  kernel = openKernel(module);
  for (const job of goldenJobs) undisturbed[job.name] = goldenFingerprint(kernel, job);
}, 120_000);

describe.each(goldenJobs)('$name gives the same bits', (job) => {
  it('twice in one instance, whose memory is full of other jobs by now', () => {
    expect(goldenFingerprint(kernel, job)).toBe(undisturbed[job.name]);
  });

  it('with its slices computed backwards, in a fresh instance', () => {
    expect(goldenFingerprint(openKernel(module), job, true)).toBe(undisturbed[job.name]);
  });

  it('assembled by an instance that computed none of its slices', () => {
    openGolden(kernel, job);
    const payloads = Array.from({ length: kernel.sliceCount() }, (_, i) => kernel.computeSlice(i));
    const other = openKernel(module);
    openGolden(other, job);
    expect(fingerprint(payloads, other.assemble(payloads))).toBe(undisturbed[job.name]);
  });

  const original = Object.getOwnPropertyDescriptors(Math);
  afterEach(() => {
    Object.defineProperties(Math, original);
  });
  it('with every function of the host’s Math throwing', () => {
    // the validation library sets up its schemas once with Math.min; what it parses afterwards needs none
    goldenFingerprint(kernel, job);
    for (const [name, { value }] of Object.entries(original)) {
      if (typeof value !== 'function') continue;
      const refuse = () => {
        throw new Error(`the host computed Math.${name}`);
      };
      Object.defineProperty(Math, name, { value: refuse, configurable: true, writable: true });
    }
    expect(() => Math.sqrt(2)).toThrow('Math.sqrt');
    expect(goldenFingerprint(kernel, job)).toBe(undisturbed[job.name]);
  });
});

describe('all golden jobs give the same bits', () => {
  it.each([1, 2, 4])(
    'on %d threads',
    async (threads) => {
      const parts = await Promise.all(Array.from({ length: threads }, (_, thread) => computeShare(thread, threads)));
      for (const job of goldenJobs) {
        const payloads: Uint8Array[] = [];
        for (const part of parts) for (const [slice, payload] of part[job.name] ?? []) payloads[slice] = payload;
        openGolden(kernel, job);
        expect(fingerprint(payloads, kernel.assemble(payloads)), job.name).toBe(undisturbed[job.name]);
      }
    },
    120_000,
  );

  // other flags still tier up on Node.js 20
  it.each(['--liftoff-only', '--no-liftoff'])(
    'compiled by V8 with %s',
    async (flag) => {
      const script = fileURLToPath(new URL('../testing/print-fingerprints.ts', import.meta.url));
      const { stdout } = await promisify(execFile)(process.execPath, [flag, '--import', 'tsx', script]);
      expect(JSON.parse(stdout)).toEqual(undisturbed);
    },
    120_000,
  );
});

type Share = { [name: string]: [number, Uint8Array][] };
async function computeShare(thread: number, threads: number): Promise<Share> {
  const worker = new Worker(new URL('../testing/slice-thread.mjs', import.meta.url), {
    workerData: { module, thread, threads },
  });
  try {
    return await new Promise<Share>((resolve, reject) => {
      worker.once('message', resolve);
      worker.once('error', reject);
    });
  } finally {
    await worker.terminate();
  }
}
