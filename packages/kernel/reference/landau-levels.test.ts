import type { Json } from '@nightcone/models';
import { beforeAll, describe, expect, it } from 'vitest';
import { type KernelInstance, loadCurrentKernel, openKernel } from '../src/node.ts';
import { checkOf, runJob, valuesOf } from '../testing/run-job.ts';

/**
 * Whole jobs of `landau-levels` against values from outside. Tags in brackets number the check tables that were made
 * with general-purpose libraries from the published formulas named beside them.
 */
let kernel: KernelInstance;
beforeAll(async () => {
  kernel = openKernel((await loadCurrentKernel()).module);
});

type Members = { [name: string]: Json };
const monolayer = (members: Members = {}): Json => ({
  kind: 'monolayer',
  massEv: 0,
  electricFieldEvPerNm: 0,
  kPerNm: 0,
  ...members,
});
const bilayer = (members: Members = {}): Json => ({
  kind: 'bilayer',
  gamma1Ev: 0.39,
  v3Ratio: 0,
  v4Ratio: 0,
  biasEv: 0,
  dimerOffsetEv: 0,
  ...members,
});
function run(parameters: Members, method: Json = { kind: 'auto' }) {
  const small = { carrierPerNm2: 0, energyEv: 0, broadening: { kind: 'none' } };
  return runJob(kernel, { model: 'landau-levels', parameters: { ...small, ...parameters }, numerics: { method } });
}
function expectClose(values: number[], expected: number[], relative = 1e-10): void {
  expect(values).toHaveLength(expected.length);
  values.forEach((value, i) => {
    const wanted = expected[i] as number;
    expect(Math.abs(value - wanted), `entry ${i}: ${value} against ${wanted}`).toBeLessThan(
      Math.max(relative * Math.abs(wanted), 1e-11),
    );
  });
}
const routes: { name: string; method: Json; relative: number }[] = [
  { name: 'closed form', method: { kind: 'closed-form' }, relative: 1e-10 },
  { name: 'ladder', method: { kind: 'ladder', size: 30 }, relative: 1e-10 },
  { name: 'grid', method: { kind: 'grid', cellsPerMagneticLength: 80, boxMagneticLengths: 9 }, relative: 1e-9 },
];

describe.each(routes)('one layer by $name', ({ method, relative }) => {
  // published source: J. W. McClure, Phys. Rev. 104, 666 (1956), E_n = √(2n) ħv/l
  it.each([
    [1, [0.0317011839181, 0.0448322442402, 0.0549080612062, 0.0708860022081], 25.6556418152],
    [10, [0.100247945705, 0.141772004416, 0.173634535316, 0.224161221201], 8.11302629696],
    [25, [0.15850591959, 0.224161221201, 0.274540306031, 0.35443001104], 5.13112836304],
  ])('[B1] massless levels at %d T', (fieldT, [e1, e2, e3, e5], length) => {
    const result = run({ fieldT, levels: 5, valleys: 'K' }, method);
    const energies = valuesOf(result, 'energies');
    expectClose(
      [6, 7, 8, 10].map((i) => energies[i] as number),
      [e1, e2, e3, e5] as number[],
      relative,
    );
    expect(energies[5]).toBe(0);
    expectClose(valuesOf(result, 'magneticLengthNm'), [length]);
  });

  // published source: F. D. M. Haldane, PRL 61, 2015 (1988) for the sign of n = 0
  it('[B2] a mass puts n = 0 at −τ sgn(B) m', () => {
    const k = [-0.150330639712, -0.112025223133, -0.05, 0.112025223133, 0.150330639712];
    const kPrime = k.map((value, i) => (i === 2 ? -value : value));
    const both = { levels: 2, system: monolayer({ massEv: 0.05 }), valleys: 'both' };
    expectClose(valuesOf(run({ ...both, fieldT: 10 }, method), 'energies'), [...k, ...kPrime], relative);
    expectClose(valuesOf(run({ ...both, fieldT: -10 }, method), 'energies'), [...kPrime, ...k], relative);
  });
});

describe('one layer in a crossed field', () => {
  // published source: V. Lukose, R. Shankar, G. Baskaran, PRL 98, 116802 (2007); mass by the boost
  const cases: [number, number, number, number[]][] = [
    [0.00262119212782, 1, 0, [-0.14416758167, -0.10547917532, -0.0120771, 0.081324975317, 0.12001338167]],
    [0.00524238425565, 1, 0, [-0.12559798854, -0.095885790784, -0.0241542, 0.047577390784, 0.077289588538]],
    [0.00524238425565, 1, 0.04, [-0.13052544721, -0.10269986262, -0.0561542, 0.05439146262, 0.08221704721]],
    [0.00524238425565, -1, 0.04, [-0.13052544721, -0.10269986262, 0.0078458, 0.05439146262, 0.08221704721]],
    [0.00830044173811, 1, 0, [-0.062980974128, -0.055735726086, -0.03824415, -0.020752573914, -0.013507325872]],
  ];
  it.each(cases)('[B3] F = %d eV/nm, τ = %d, m = %d', (electricFieldEvPerNm, tau, massEv, expected) => {
    const question = {
      fieldT: 10,
      levels: 2,
      valleys: tau > 0 ? 'K' : 'K-prime',
      system: monolayer({ massEv, electricFieldEvPerNm, kPerNm: 0.07 }),
    };
    expectClose(valuesOf(run(question), 'energies'), expected);
    const grid = run(question, { kind: 'grid', cellsPerMagneticLength: 80, boxMagneticLengths: 9 });
    // the finest grid's own error, measured 1e-9 relative at β = 0.95
    valuesOf(grid, 'energies').forEach((value, i) => {
      expect(Math.abs(value - (expected[i] as number))).toBeLessThan(2e-8);
    });
  });

  it('leaves collapsed fields empty and finishes', () => {
    const fieldT = { kind: 'values', values: [0, 5, 8.7, 8.8, 10] };
    const result = run({ fieldT, levels: 1, valleys: 'K', system: monolayer({ electricFieldEvPerNm: 0.00764 }) });
    // v B = F at 8.744 T
    expect(valuesOf(result, 'energiesValid')).toEqual([0, 0, 0, 0, 0, 0, 0, 0, 0, 1, 1, 1, 1, 1, 1]);
    expect(valuesOf(result, 'energies').slice(0, 9)).toEqual(Array(9).fill(0));
    expect(result.certificate.numbers).toMatchObject({ levelsWanted: 6, levelsFound: 6 });
  });

  it('holds its collapse law in the certificate', () => {
    const result = run({ fieldT: 10, levels: 3, system: monolayer({ electricFieldEvPerNm: 0.00524238425565 }) });
    expect(checkOf(result, 'crossed-field-collapse')).toMatchObject({
      expected: expect.closeTo(0.8 ** 1.5, 10),
      holds: true,
    });
    expect(checkOf(result, 'grid-difference')?.holds).toBe(true);
  });
});

describe('two layers', () => {
  // published source: J. M. Pereira, F. M. Peeters, P. Vasilopoulos, PRB 76, 115419 (2007)
  it('[B4] low band at 10 T, and the two zero modes', () => {
    const low = [0.0333938281053, 0.0551396960816, 0.0747571857233];
    const energies = valuesOf(run({ fieldT: 10, levels: 3, valleys: 'K', system: bilayer() }), 'energies');
    expectClose(energies, [...low.map((e) => -e).reverse(), 0, 0, ...low]);
  });

  it('[B4] high band, in a list long enough to reach it', () => {
    const energies = valuesOf(run({ fieldT: 10, levels: 60, valleys: 'K', system: bilayer() }), 'energies');
    for (const high of [0.425598172105, 0.446439096637, 0.465681132868, Math.sqrt(0.39 ** 2 + 0.100247945705 ** 2)]) {
      expect(Math.min(...energies.map((e) => Math.abs(e - high)))).toBeLessThan(1e-11);
    }
  });

  it.each(['auto', 'ladder'])('[B5] a bias of 0.1 eV by %s', (kind) => {
    const k = [
      -0.077925196018, -0.06285930489, -0.050051871375, -0.05, -0.043824305671, 0.055584169949, 0.067914854457,
      0.082609235611,
    ];
    const question = { fieldT: 10, levels: 6, system: bilayer({ biasEv: 0.1 }), valleys: 'both' };
    const energies = valuesOf(run(question, kind === 'auto' ? { kind } : { kind: 'ladder', size: 60 }), 'energies');
    const nearest = (list: number[]) =>
      [...list]
        .sort((a, b) => Math.abs(a) - Math.abs(b))
        .slice(0, 8)
        .sort((a, b) => a - b);
    expectClose(nearest(energies.slice(0, 14)), k);
    expectClose(nearest(energies.slice(14)), k.map((e) => -e).reverse());
  });

  // published source: E. McCann, M. Koshino, Rep. Prog. Phys. 76, 056503 (2013) for the matrix
  const converged = [0.003158025725, 0.006245269718, 0.008751394639, 0.01119967727, 0.01362155618];
  it.each([
    [10, [0.003158888479, 0.006260501497, 0.008775906184, 0.01123495934, 0.01394003138]],
    [20, [0.003158026071, 0.006245270331, 0.008751410393, 0.01119970071, 0.01362158962]],
    [40, converged],
    [80, converged],
  ])('[B6] skew hopping, ladder of %d states', (size, expected) => {
    const question = { fieldT: 1, levels: 5, valleys: 'K', system: bilayer({ v3Ratio: 0.1 }) };
    const result = run(question, { kind: 'ladder', size });
    const energies = valuesOf(result, 'energies');
    expectClose(energies.slice(5, 7), [0, 0]);
    expectClose(energies.slice(7), expected, 2e-9);
    // every estimate covers the true error
    valuesOf(result, 'energyErrorEv')
      .slice(7)
      .forEach((error, i) => {
        const distance = Math.abs((energies[7 + i] as number) - (converged[i] as number));
        expect(distance).toBeLessThanOrEqual(1.01 * error + 1e-11); // the table has twelve decimals
      });
  });

  it('[B6] the ladder finds its own size', () => {
    const result = run({ fieldT: 1, levels: 5, valleys: 'K', system: bilayer({ v3Ratio: 0.1 }) });
    expectClose(valuesOf(result, 'energies').slice(7), converged, 2e-10);
    expect(result.certificate.numbers.largestErrorEv).toBeLessThan(1e-11);
  });

  it('agrees with the ladder where v₄, bias and dimer offset act together', () => {
    const system = bilayer({ v4Ratio: 0.05, biasEv: 0.04, dimerOffsetEv: 0.02 });
    const closed = run({ fieldT: { kind: 'values', values: [2, -10] }, levels: 6, system });
    const ladder = run(
      { fieldT: { kind: 'values', values: [2, -10] }, levels: 6, system },
      { kind: 'ladder', size: 60 },
    );
    expectClose(valuesOf(closed, 'energies'), valuesOf(ladder, 'energies'), 1e-12);
    expect(checkOf(closed, 'ladder-difference')?.holds).toBe(true);
    expect(checkOf(closed, 'zero-mode-valley')).toMatchObject({ expected: 0.02, holds: true }); // B < 0: K at +U/2
  });

  // published source: E. McCann, V. I. Fal'ko, PRL 96, 086805 (2006)
  it('has its two-band limit at low field', () => {
    const result = run({ fieldT: 0.1, levels: 2, system: bilayer() });
    const check = checkOf(result, 'two-band-limit');
    expect(check?.holds).toBe(true);
    expect((check?.computed as number) / (check?.expected as number)).toBeCloseTo(1, 2);
  });
});

describe('what the levels hold', () => {
  // published source: V. P. Gusynin, S. G. Sharapov, PRL 95, 146801 (2005)
  it.each([
    ['lorentzian', 'hwhmEv', [0.0490623101508, 0.639421543419, 0.0869396789215]],
    ['gaussian', 'sigmaEv', [0.000258880036932, 0.771675034576, 0.000374196746443]],
  ])('[B7] density with %s lines', (kind, width, expected) => {
    const energyEv = { kind: 'values', values: [0.02, 0.1002, 0.12] };
    const result = run({ fieldT: 10, levels: 30, valleys: 'both', energyEv, broadening: { kind, [width]: 0.005 } });
    expectClose(valuesOf(result, 'density'), expected, 1e-10);
  });

  it('plateaus stand at ±2, ±6, ±10 for one layer and ±4, ±8 for two', () => {
    const energyEv = { kind: 'values', values: [-0.12, -0.05, 0.05, 0.12, 0.15] };
    const one = valuesOf(run({ fieldT: 10, levels: 3, valleys: 'both', energyEv }), 'hallPlateaus');
    expect(one).toEqual([-6, -2, 2, 6, 10]);
    const two = run({
      fieldT: 10,
      levels: 3,
      valleys: 'both',
      system: bilayer(),
      energyEv: { kind: 'values', values: [-0.04, -0.02, 0.02, 0.04] },
    });
    expect(valuesOf(two, 'hallPlateaus')).toEqual([-8, -4, 4, 8]);
    const massive = run({ fieldT: 10, levels: 3, valleys: 'both', system: monolayer({ massEv: 0.02 }), energyEv: 0 });
    expect(valuesOf(massive, 'hallPlateaus')).toEqual([0]);
    const cone = run({ fieldT: 10, levels: 3, valleys: 'K', spin: { kind: 'degenerate', factor: 1 }, energyEv: 0.05 });
    expect(valuesOf(cone, 'hallPlateaus')).toEqual([0.5]);
  });

  it('sharp levels fill one after the other, and a full one leaves the Fermi energy in the middle of the gap', () => {
    const perLevel = 10 / 4135.667696923859;
    const carrierPerNm2 = { kind: 'values', values: [0, 1.9 * perLevel, 2 * perLevel, 2.1 * perLevel, 10] };
    const result = run({ fieldT: 10, levels: 3, valleys: 'both', carrierPerNm2 });
    expectClose(valuesOf(result, 'fermiEnergy'), [0, 0, 0.100247945705 / 2, 0.100247945705, 0]);
    expect(valuesOf(result, 'fermiEnergyValid')).toEqual([1, 1, 1, 1, 0]);
    expectClose(valuesOf(result, 'fillingFactors').slice(0, 4), [0, 1.9, 2, 2.1]);
  });

  const shapes: { broadening: Json; temperatureK: number }[] = [
    { broadening: { kind: 'none' }, temperatureK: 20 },
    { broadening: { kind: 'lorentzian', hwhmEv: 0.004 }, temperatureK: 0 },
    { broadening: { kind: 'lorentzian', hwhmEv: 0.004 }, temperatureK: 40 },
    { broadening: { kind: 'gaussian', sigmaEv: 0.004 }, temperatureK: 0 },
    { broadening: { kind: 'gaussian', sigmaEv: 0.004 }, temperatureK: 20 },
    { broadening: { kind: 'gaussian', sigmaEv: 0.004 }, temperatureK: 200 },
  ];
  it.each(shapes)(
    'charge and Fermi energy agree with direct integration: $broadening.kind, $temperatureK K',
    (shape) => {
      const carrierPerNm2 = { kind: 'values', values: [-0.011, 0, 0.002, 0.0123] };
      const energyEv = { kind: 'values', values: [-0.13, 0.003, 0.05, 0.11] };
      const result = run({ fieldT: 10, levels: 4, valleys: 'both', carrierPerNm2, energyEv, ...shape });
      const levels = valuesOf(result, 'energies');
      const thermal = 8.617333262145179e-5 * shape.temperatureK;
      valuesOf(result, 'chargeDensity').forEach((charge, i) => {
        const expected =
          (2 * 10 * (occupied(levels, energyEv.values[i] as number, shape.broadening as Members, thermal) - 9)) /
          4135.667696923859;
        expect(Math.abs(charge - expected)).toBeLessThan(2e-11);
      });
      expect(checkOf(result, 'carrier-round-trip')?.holds).toBe(true);
      expect(valuesOf(result, 'fermiEnergy')[1]).toBeCloseTo(0, 12);
    },
  );

  it('counts a Zeeman splitting of (g/2) μ_B B / cos ϑ to either side', () => {
    const split = (tiltDeg: number) =>
      valuesOf(run({ fieldT: 10, levels: 0, valleys: 'K', spin: { kind: 'zeeman', gFactor: 2, tiltDeg } }), 'energies');
    // CODATA 2022: μ_B = 5.7883817982e-5 eV/T
    expectClose(split(0), [5.7883817982e-4, -5.7883817982e-4]);
    expectClose(split(60), [2 * 5.7883817982e-4, -2 * 5.7883817982e-4]);
  });

  it('lists the allowed transitions', () => {
    const result = run({ fieldT: 10, levels: 2, valleys: 'K' });
    expect(valuesOf(result, 'transitionFrom')).toEqual([-1, 0, -2, -1, 1, -2]);
    expect(valuesOf(result, 'transitionTo')).toEqual([0, 1, 1, 2, 2, -1]);
    const [e1, e2] = [0.100247945705, 0.141772004416];
    expectClose(valuesOf(result, 'transitions'), [e1, e1, e1 + e2, e1 + e2, e2 - e1, e2 - e1]);
  });

  it('leaves zero field empty in a fan and keeps the rest', () => {
    const result = run({
      fieldT: { kind: 'range', start: 0, stop: 2, count: 3 },
      levels: 1,
      valleys: 'K',
      system: bilayer(),
    });
    expect(valuesOf(result, 'fieldT')).toEqual([0, 1, 2]);
    for (const name of ['energies', 'chargeDensity', 'fermiEnergy', 'fillingFactors', 'magneticLengthNm']) {
      const valid = valuesOf(result, `${name}Valid`);
      expect(
        valid.slice(0, valid.length / 3).every((flag) => flag === 0),
        name,
      ).toBe(true);
      expect(
        valid.slice(valid.length / 3).every((flag) => flag === 1),
        name,
      ).toBe(true);
    }
  });
});

/** Σ ∫ L(ε − e) f(ε − μ) dε by Simpson's rule on the host, or the closed step. */
function occupied(levels: number[], mu: number, line: Members, thermal: number): number {
  const width = Number(line.hwhmEv ?? line.sigmaEv ?? 0);
  const fermi = (x: number) => (thermal === 0 ? (x > 0 ? 1 : 0) : 1 / (1 + Math.exp(-x / thermal)));
  if (line.kind === 'none') return levels.reduce((sum, e) => sum + fermi(mu - e), 0);
  const below = (x: number) =>
    line.kind === 'lorentzian'
      ? 0.5 + Math.atan(x / width) / Math.PI
      : 0.5 * (1 + errorFunction(x / width / Math.SQRT2));
  if (thermal === 0) return levels.reduce((sum, e) => sum + below(mu - e), 0);
  // ∫ below(x + kT u) · (−f'(u)) du, u = −40 … 40
  const steps = 8000;
  let total = 0;
  for (let i = 0; i <= steps; i++) {
    const u = -40 + (80 * i) / steps;
    const weight = (i === 0 || i === steps ? 1 : i % 2 === 1 ? 4 : 2) / 3 / (4 * Math.cosh(u / 2) ** 2);
    for (const e of levels) total += weight * below(mu - e + thermal * u);
  }
  return (total * 80) / steps;
}

/** erf by its Taylor series (Abramowitz, Stegun 7.1.5), enough for |x| ≤ 5. */
function errorFunction(x: number): number {
  if (Math.abs(x) > 5) return Math.sign(x);
  let term = x;
  let sum = x;
  for (let n = 1; n < 120; n++) {
    term *= (-x * x) / n;
    sum += term / (2 * n + 1);
  }
  return (2 / Math.sqrt(Math.PI)) * sum;
}
