import { execFile } from 'node:child_process';
import { fileURLToPath } from 'node:url';
import { promisify } from 'node:util';
import type { Json } from '@nightcone/models';
import { beforeAll, describe, expect, it } from 'vitest';
import { complete, runJob } from '../testing/run-job.ts';
import { KernelRefusal, type LoadedKernel, loadCurrentKernel, openKernel, statusNames, type Tables } from './node.ts';

let current: LoadedKernel;
beforeAll(async () => {
  current = await loadCurrentKernel();
});

const landau = (parameters: { [name: string]: Json } = {}, method: Json = { kind: 'auto' }) => ({
  model: 'landau-levels',
  parameters: { fieldT: 10, levels: 2, energyEv: 0, carrierPerNm2: 0, ...parameters },
  numerics: { method },
});

/** Status that a piece of work is refused with. */
function statusOf(work: () => unknown): string {
  try {
    work();
  } catch (error) {
    if (error instanceof KernelRefusal) {
      expect(statusNames[error.code]).toBe(error.status);
      expect(error.message.length).toBeGreaterThan(10);
      return error.status;
    }
    throw error;
  }
  return 'ok';
}

/** The module alone, for input that the host side would never write. */
function rawKernel() {
  const host = {
    progress: () => undefined,
    abort: (code: number) => {
      throw new Error(`abort ${code}`);
    },
  };
  return new WebAssembly.Instance(current.module, { host }).exports as unknown as {
    memory: WebAssembly.Memory;
    allocate(bytes: number): number;
    open(pointer: number, length: number): number;
    assemble(pointer: number, length: number): number;
    computeSlice(index: number): number;
  };
}

describe('status codes', () => {
  it('ok', () => {
    expect(statusOf(() => runJob(openKernel(current.module), landau()))).toBe('ok');
  });

  it.each([
    ['another magic number', [0, 1, 0, 0]],
    ['another interface', [0x3152434e, 2, 0, 0]],
    ['a model that does not exist', [0x3152434e, 1, 999, 0]],
    ['a record that ends too early', [0x3152434e, 1, 0, 0]],
  ])('invalid-record: %s', (_, header) => {
    const kernel = rawKernel();
    const pointer = kernel.allocate(16);
    new Uint32Array(kernel.memory.buffer, pointer, 4).set(header);
    expect(kernel.open(pointer, 16)).toBe(1);
    expect(kernel.open(pointer, 15)).toBe(1);
  });

  it.each<{ [member: string]: Json }>([
    { kind: 'range', start: 0, stop: 1, count: 0 },
    { kind: 'values', values: [] },
    { kind: 'whole-zone', count: 5 },
  ])('invalid-record: an axis that no validation would pass, %j', (fieldT) => {
    const kernel = openKernel(current.module);
    const specification = complete(current.manifest, landau());
    specification.parameters.fieldT = fieldT;
    expect(statusOf(() => kernel.open(specification))).toBe('invalid-record');
  });

  it('invalid-parameter: a ladder too short for its levels', () => {
    expect(
      statusOf(() => runJob(openKernel(current.module), landau({ levels: 50 }, { kind: 'ladder', size: 10 }))),
    ).toBe('invalid-parameter');
  });

  it('not-converged: a bias so large in a field so low that the ladder would need millions of blocks', () => {
    const system = { kind: 'bilayer', gamma1Ev: 0.39, v3Ratio: 0, v4Ratio: 0, biasEv: 1, dimerOffsetEv: 0 };
    expect(statusOf(() => runJob(openKernel(current.module), landau({ system, fieldT: 1e-6 })))).toBe('not-converged');
  });

  it('memory-exceeded: by the formula when opened', () => {
    const long = { kind: 'range', start: 0, stop: 1, count: 20001 };
    expect(statusOf(() => runJob(openKernel(current.module), landau({ fieldT: long, energyEv: long })))).toBe(
      'memory-exceeded',
    );
  });

  it('memory-exceeded: inside the arena, by host.abort', () => {
    const kernel = openKernel(current.module);
    const specification = complete(current.manifest, landau());
    // past every validation: an axis of 10⁹ points
    specification.parameters.fieldT = { kind: 'range', start: 0, stop: 1, count: 1e9 };
    expect(statusOf(() => kernel.open(specification))).toBe('memory-exceeded');
    expect(statusOf(() => runJob(kernel, landau()))).toBe('ok');
  });

  it('outside-table: a profile narrower than the ribbon', () => {
    const digest = 'a'.repeat(64);
    const column = (role: string, values: number[]) => ({ role, unit: '', values: new Float64Array(values) });
    const tables: Tables = new Map([[digest, { columns: [column('x', [-2, 2]), column('value', [0, 0.1])] }]]);
    const parameters = {
      width: { kind: 'nm', widthNm: 10 },
      potentialEv: { kind: 'table', table: digest },
      kPerNm: 0,
      energyEv: 0,
    };
    const question = { model: 'continuum-ribbon', parameters };
    expect(statusOf(() => runJob(openKernel(current.module), question, { tables }))).toBe('outside-table');
  });

  it('inertia-mismatch: a velocity so small that the squares of the bonds vanish, and all levels coincide', () => {
    const kernel = openKernel(current.module);
    const parameters = { edge: { kind: 'zigzag' }, kPerNm: 0, energyEv: 0, width: { kind: 'nm', widthNm: 10 } };
    const spectrum = { kind: 'window', eMin: -0.001, eMax: 0.001 };
    const numerics = { grid: { kind: 'single', cells: 20 } };
    const question = { model: 'continuum-ribbon', parameters: { ...parameters, spectrum }, numerics };
    const specification = complete(current.manifest, question);
    specification.parameters.diracVelocityEvNm = 1e-320;
    kernel.open(specification);
    expect(statusOf(() => kernel.computeSlice(0))).toBe('inertia-mismatch');
  });

  it('not-finite: a velocity whose square overflows', () => {
    const kernel = openKernel(current.module);
    const specification = complete(current.manifest, landau());
    specification.parameters.diracVelocityEvNm = 1e200;
    kernel.open(specification);
    expect(statusOf(() => kernel.assemble([kernel.computeSlice(0)]))).toBe('not-finite');
  });

  it('payload-mismatch: too few, too many, too short, unaligned', () => {
    const kernel = openKernel(current.module);
    kernel.open(complete(current.manifest, landau()));
    const payload = kernel.computeSlice(0);
    for (const payloads of [[], [payload, payload], [payload.subarray(8)], [payload.subarray(0, payload.length - 1)]]) {
      expect(statusOf(() => kernel.assemble(payloads))).toBe('payload-mismatch');
    }
    const raw = rawKernel();
    expect(raw.assemble(raw.allocate(8), 8)).toBe(10); // nothing open
  });

  it('method-unavailable: no closed form with v₃, no crossed ladder, no bilayer grid', () => {
    const bilayer = { kind: 'bilayer', gamma1Ev: 0.39, v3Ratio: 0.1, v4Ratio: 0, biasEv: 0, dimerOffsetEv: 0 };
    const crossed = { kind: 'monolayer', massEv: 0, electricFieldEvPerNm: 0.001, kPerNm: 0 };
    const grid = { kind: 'grid', cellsPerMagneticLength: 20, boxMagneticLengths: 8 };
    for (const [system, method] of [
      [bilayer, { kind: 'closed-form' }],
      [bilayer, grid],
      [crossed, { kind: 'ladder', size: 40 }],
    ] as const) {
      expect(statusOf(() => runJob(openKernel(current.module), landau({ system }, method)))).toBe('method-unavailable');
    }
  });

  it('out-of-order: nothing open, and a slice that does not exist', () => {
    const kernel = openKernel(current.module);
    expect(statusOf(() => kernel.computeSlice(0))).toBe('out-of-order');
    kernel.open(complete(current.manifest, landau()));
    expect(statusOf(() => kernel.computeSlice(1))).toBe('out-of-order');
    expect(statusOf(() => kernel.computeSlice(-1))).toBe('out-of-order');
    kernel.close();
    expect(statusOf(() => kernel.assemble([]))).toBe('out-of-order');
  });
});

describe('the host side', () => {
  it('imports two functions of the host and nothing else', () => {
    const imports = WebAssembly.Module.imports(current.module);
    expect(imports).toHaveLength(2);
    expect(imports).toEqual(
      expect.arrayContaining([
        { module: 'host', name: 'progress', kind: 'function' },
        { module: 'host', name: 'abort', kind: 'function' },
      ]),
    );
  });

  it('lets an error thrown in onProgress through unchanged, and the instance takes the next job', () => {
    const cancelled = new Error('cancelled');
    let shouldCancel = true;
    const kernel = openKernel(current.module, {
      onProgress: () => {
        if (shouldCancel) throw cancelled;
      },
    });
    expect(() => runJob(kernel, landau())).toThrow(cancelled);
    shouldCancel = false;
    expect(runJob(kernel, landau()).arrays.length).toBeGreaterThan(10);
  });

  it('reports progress inside a slice', () => {
    const seen: [number, number][] = [];
    runJob(
      openKernel(current.module, { onProgress: (done, total) => seen.push([done, total]) }),
      landau({ fieldT: { kind: 'range', start: 1, stop: 4, count: 4 } }),
    );
    expect(seen.slice(0, 4)).toEqual([
      [0, 4],
      [1, 4],
      [2, 4],
      [3, 4],
    ]);
  });

  it('hands payloads out as copies', () => {
    const kernel = openKernel(current.module);
    kernel.open(complete(current.manifest, landau({ fieldT: { kind: 'range', start: 1, stop: 2, count: 17 } })));
    const first = kernel.computeSlice(0);
    const before = first.slice();
    kernel.computeSlice(1);
    expect(first).toEqual(before);
  });

  it('calls it a crash when the machine has no memory left', async () => {
    // at most 32 pages for any memory of that process: memory.grow fails far below the module's own limit
    const script = fileURLToPath(new URL('../testing/small-machine.ts', import.meta.url));
    const { stdout } = await promisify(execFile)(process.execPath, [
      '--wasm-max-mem-pages=32',
      '--import',
      'tsx',
      script,
    ]);
    expect(stdout.trim()).toBe('KernelCrash');
  }, 30_000);
});
