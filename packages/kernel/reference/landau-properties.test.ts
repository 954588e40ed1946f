import type { Json } from '@nightcone/models';
import fc from 'fast-check';
import { beforeAll, describe, expect, it } from 'vitest';
import { type KernelInstance, loadCurrentKernel, openKernel } from '../src/node.ts';
import { runJob, valuesOf } from '../testing/run-job.ts';

let kernel: KernelInstance;
beforeAll(async () => {
  kernel = openKernel((await loadCurrentKernel()).module);
});

type Members = { [name: string]: Json };
function energies(system: Members, members: Members, method: Json = { kind: 'auto' }): number[] {
  const parameters = {
    carrierPerNm2: 0,
    energyEv: 0,
    broadening: { kind: 'none' },
    levels: 5,
    valleys: 'K',
    system,
    ...members,
  };
  return valuesOf(runJob(kernel, { model: 'landau-levels', parameters, numerics: { method } }), 'energies');
}
function expectEqual(values: number[], expected: number[], scale: number): void {
  expect(values).toHaveLength(expected.length);
  values.forEach((value, i) => {
    expect(Math.abs(value - (expected[i] as number))).toBeLessThanOrEqual(scale);
  });
}
const between = (min: number, max: number) => fc.double({ min, max, noNaN: true });
const field = between(0.5, 30);
const monolayer = fc.record({
  kind: fc.constant('monolayer'),
  massEv: between(-0.2, 0.2),
  electricFieldEvPerNm: fc.constant(0),
  kPerNm: between(-0.1, 0.1),
});
const bilayer = fc.record({
  kind: fc.constant('bilayer'),
  gamma1Ev: between(0.2, 0.5),
  v3Ratio: fc.constant(0),
  v4Ratio: between(-0.1, 0.1),
  biasEv: between(-0.1, 0.1),
  dimerOffsetEv: between(-0.03, 0.03),
});
const runs = { seed: 20_260, numRuns: 40 };

describe('one layer, at random', () => {
  it('time reversal: K in B is K′ in −B', () => {
    fc.assert(
      fc.property(monolayer, field, (system, b) => {
        expect(energies(system, { fieldT: b })).toEqual(energies(system, { fieldT: -b, valleys: 'K-prime' }));
      }),
      runs,
    );
  });

  it('particle–hole: m → −m turns the ladder over', () => {
    fc.assert(
      fc.property(monolayer, field, (system, b) => {
        const turned = energies({ ...system, massEv: -system.massEv }, { fieldT: b })
          .map((e) => -e)
          .reverse();
        expectEqual(energies(system, { fieldT: b }), turned, 0);
      }),
      runs,
    );
  });

  it('closed form and ladder agree to rounding', () => {
    fc.assert(
      fc.property(monolayer, field, fc.integer({ min: 7, max: 60 }), (system, b, size) => {
        expectEqual(energies(system, { fieldT: b }), energies(system, { fieldT: b }, { kind: 'ladder', size }), 1e-13);
      }),
      runs,
    );
  });

  it('closed form and grid agree within the grid’s error in a crossed field', () => {
    const grid = { kind: 'grid', cellsPerMagneticLength: 40, boxMagneticLengths: 8 };
    fc.assert(
      fc.property(monolayer, between(5, 20), between(-0.7, 0.7), (system, b, beta) => {
        const crossed = { ...system, electricFieldEvPerNm: (beta * 0.5751 * b) / 658.2119569509067 };
        expectEqual(energies(crossed, { fieldT: b }), energies(crossed, { fieldT: b }, grid), 2e-7);
      }),
      { ...runs, numRuns: 15 },
    );
  });

  it('massless levels scale as √B', () => {
    fc.assert(
      fc.property(field, between(0.1, 3), (b, factor) => {
        const cone = { kind: 'monolayer', massEv: 0, electricFieldEvPerNm: 0, kPerNm: 0 };
        const scaled = energies(cone, { fieldT: b }).map((e) => e * Math.sqrt(factor));
        expectEqual(energies(cone, { fieldT: b * factor }), scaled, 1e-14);
      }),
      runs,
    );
  });
});

describe('two layers, at random', () => {
  it('the other valley is the other bias', () => {
    fc.assert(
      fc.property(bilayer, field, (system, b) => {
        const other = energies({ ...system, biasEv: -system.biasEv }, { fieldT: b, valleys: 'K-prime' });
        expectEqual(energies(system, { fieldT: b }), other, 0);
      }),
      runs,
    );
  });

  it('quartic blocks and the whole ladder agree to rounding', () => {
    fc.assert(
      fc.property(bilayer, between(3, 30), (system, b) => {
        expectEqual(
          energies(system, { fieldT: b }),
          energies(system, { fieldT: b }, { kind: 'ladder', size: 50 }),
          1e-13,
        );
      }),
      runs,
    );
  });

  it('skew hopping of either sign gives the same levels', () => {
    fc.assert(
      fc.property(bilayer, between(2, 20), between(0.01, 0.15), (system, b, v3) => {
        const ladder = { kind: 'ladder', size: 60 };
        expectEqual(
          energies({ ...system, v4Ratio: 0, v3Ratio: v3 }, { fieldT: b }, ladder),
          energies({ ...system, v4Ratio: 0, v3Ratio: -v3 }, { fieldT: b }, ladder),
          1e-13,
        );
      }),
      { ...runs, numRuns: 15 },
    );
  });
});
