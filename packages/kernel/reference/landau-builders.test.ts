import type { Json, KernelManifest } from '@nightcone/models';
import { beforeAll, describe, expect, it } from 'vitest';
import { encodeSpecification, readManifest } from '../src/index.ts';
import { complete } from '../testing/run-job.ts';
import { compileTestKernel } from '../testing/test-module.ts';

/** Values that no job returns, taken from the builders themselves through assembly/testing/core.ts. */
interface Builders {
  memory: WebAssembly.Memory;
  allocate(bytes: number): number;
  open(pointer: number, length: number): number;
  levelsOnGrid(
    b: number,
    tau: number,
    top: number,
    from: number,
    to: number,
    cells: number,
    values: number,
    errors: number,
  ): number;
  bilayerAtZeroField(tau: number, qx: number, qy: number, values: number): void;
  bilayerBlockLevels(n: number, sign: number, square: number, values: number): number;
}

let builders: Builders;
let manifest: KernelManifest;
beforeAll(async () => {
  const module = await compileTestKernel('core');
  manifest = readManifest(module);
  const host = { progress: () => undefined, abort: () => undefined };
  builders = (await WebAssembly.instantiate(module, { host })).exports as unknown as Builders;
}, 120_000);

/** Opens a job so that the builders see its parameters; answers the address of 4 kB of room. */
function open(system: Json): number {
  const record = encodeSpecification(
    manifest,
    complete(manifest, { model: 'landau-levels', parameters: { system, fieldT: 10 } }),
  );
  const at = builders.allocate(record.length) >>> 0;
  new Uint8Array(builders.memory.buffer, at, record.length).set(record);
  expect(builders.open(at, record.length)).toBe(0);
  return builders.allocate(4096) >>> 0;
}
const doubles = (at: number, n: number) => [...new Float64Array(builders.memory.buffer, at, n)];

describe('the staggered grid, one grid at a time', () => {
  const length = Math.sqrt(658.2119569509067 / 10);
  const room = () => open({ kind: 'monolayer', massEv: 0, electricFieldEvPerNm: 0, kPerNm: 0 });

  // made with a general-purpose tridiagonal solver from the published operator (staggered differences: L. Susskind,
  // Phys. Rev. D 16, 3031 (1977))
  it.each([
    [10, 0.10018527115, -0.0001773],
    [20, 0.10023228074, -4.431e-5],
    [40, 0.10024402969, -1.108e-5],
    [80, 0.10024696672, -2.769e-6],
  ])('[B8] %d cells per magnetic length in a box of ±8', (cells, e1, error2) => {
    const values = room();
    expect(builders.levelsOnGrid(10, 1, 2, -8 * length, 8 * length, 16 * cells, values, values + 64)).toBe(1);
    const [, , zero, first, second] = doubles(values, 5) as [number, number, number, number, number];
    expect(zero).toBe(0);
    expect(Math.abs(first - e1)).toBeLessThan(1e-11);
    expect(Math.abs((second - 0.141772004416) / error2 - 1)).toBeLessThan(1e-3);
  });

  it('shows every level once (a co-located difference would show two)', () => {
    const values = room();
    builders.levelsOnGrid(10, -1, 4, -8 * length, 8 * length, 320, values, values + 128);
    const levels = doubles(values, 9);
    for (let i = 1; i < 9; i++) expect((levels[i] as number) - (levels[i - 1] as number)).toBeGreaterThan(0.02);
  });
});

describe('the bilayer Hamiltonian', () => {
  // published source: E. McCann, M. Koshino, Rep. Prog. Phys. 76, 056503 (2013)
  it.each([
    [1, [-0.41493918226, -0.036419253087, 0.046899604711, 0.44445883063]],
    [-1, [-0.4144980125, -0.040236542977, 0.050599152698, 0.44413540278]],
  ])('[B9] four energies at zero field, τ = %d', (tau, expected) => {
    const values = open({
      kind: 'bilayer',
      gamma1Ev: 0.39,
      v3Ratio: 0.1,
      v4Ratio: 0.05,
      biasEv: 0.04,
      dimerOffsetEv: 0.02,
    });
    builders.bilayerAtZeroField(tau, 0.2, -0.1, values);
    doubles(values, 4).forEach((value, i) => {
      expect(Math.abs(value - (expected[i] as number))).toBeLessThan(1e-11);
    });
  });

  it('is met by the ladder blocks in the limit of high n, where √(2n)/l is the wave number', () => {
    const values = open({
      kind: 'bilayer',
      gamma1Ev: 0.39,
      v3Ratio: 0,
      v4Ratio: 0.05,
      biasEv: 0.04,
      dimerOffsetEv: 0.02,
    });
    builders.bilayerAtZeroField(1, 0.2, 0, values);
    const free = doubles(values, 4);
    const n = 1e6;
    builders.bilayerBlockLevels(n, 1, (0.5751 * 0.2) ** 2 / n, values);
    doubles(values, 4).forEach((value, i) => {
      expect(Math.abs(value - (free[i] as number))).toBeLessThan(1e-6);
    });
  });
});
