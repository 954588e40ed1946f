import { beforeAll, describe, expect, it } from 'vitest';
import { type KernelInstance, loadCurrentKernel, openKernel } from '../src/node.ts';
import { valuesOf } from '../testing/run-job.ts';
import {
  armchair,
  dimerLines,
  expectLevels,
  extrapolated,
  levelsOf,
  type Members,
  nearest,
  nm,
  polynomial,
  range,
  runRibbon,
  walls,
  window,
  zigzag,
} from './ribbon-questions.ts';

let kernel: KernelInstance;
beforeAll(async () => {
  kernel = openKernel((await loadCurrentKernel()).module);
});

describe('slopes, densities, gap and channels', () => {
  it('dE/dk is the difference quotient of neighbouring levels', () => {
    const step = 1e-4;
    const ribbons: Members[] = [
      { edge: zigzag, valleys: 'K', width: nm(25), fieldT: 9 },
      { edge: armchair, width: dimerLines(70), fieldT: 9, gaugePerNm: polynomial(0, 0.01) },
      { edge: walls(1), valleys: 'K-prime', width: nm(25), fieldT: 9, massEv: polynomial(0.02, 0.001) },
    ];
    for (const ribbon of ribbons) {
      const kPerNm = range(0.1 - step, 0.1 + step, 3);
      const result = runRibbon(kernel, { ...ribbon, kPerNm, spectrum: nearest(0, 6) });
      const [below, , above] = [0, 1, 2].map((row) => levelsOf(result, row));
      const slopes = levelsOf(result, 1, 'velocities');
      slopes.forEach((slope, i) => {
        const quotient = ((above?.[i] ?? 0) - (below?.[i] ?? 0)) / (2 * step);
        expect(Math.abs(slope - quotient)).toBeLessThan(1e-6);
      });
    }
  });

  it('in a cluster the slopes are those of the crossing bands', () => {
    const result = runRibbon(kernel, { width: dimerLines(41), kPerNm: 0, spectrum: nearest(0, 2) });
    expectLevels(levelsOf(result, 0, 'velocities'), [-0.5751, 0.5751], 1e-7, 0);
    expect(valuesOf(result, 'cluster')).toEqual([0, 0]);
  });

  it.each([
    ['zigzag', { edge: zigzag, valleys: 'K', width: nm(20) }],
    ['armchair', { edge: armchair, width: dimerLines(60) }],
    ['walls', { edge: walls(1), valleys: 'K', width: nm(20) }],
  ])('densities of a %s ribbon integrate to 1', (_, ribbon) => {
    const parameters = { ...ribbon, fieldT: 12, kPerNm: range(-0.2, 0.2, 3), spectrum: nearest(0, 4) };
    const result = runRibbon(kernel, parameters, { ...extrapolated(60), states: [0, 2] });
    const position = valuesOf(result, 'positionNm');
    const a = valuesOf(result, 'densityA');
    const b = valuesOf(result, 'densityB');
    const points = position.length;
    const step = (position[1] as number) - (position[0] as number);
    expect(valuesOf(result, 'densityOffsets')).toEqual([0, 4, 8]);
    for (let row = 0; row < 8; row++) {
      let integral = 0;
      for (let i = 0; i < points; i++) {
        const end = ribbon.edge === armchair && (i === 0 || i === points - 1) ? 0.5 : 1;
        integral += end * step * ((a[row * points + i] as number) + (b[row * points + i] as number));
      }
      expect(integral).toBeCloseTo(1, 12);
    }
  });

  it('the share of valley K is 1 and 0 where the edge keeps the valleys apart, one half where it mixes them', () => {
    const request = { kPerNm: 0.1, spectrum: nearest(0, 2) };
    const apart = runRibbon(kernel, { edge: zigzag, width: nm(20), ...request });
    expect(valuesOf(apart, 'valleyWeight')).toEqual([1, 1, 0, 0]);
    const mixed = runRibbon(kernel, { width: dimerLines(40), ...request });
    for (const share of valuesOf(mixed, 'valleyWeight')) expect(share).toBeCloseTo(0.5, 10);
    // with a mass the n = 0 level of K lies at −m and that of K′ at +m (F. D. M. Haldane, PRL 61, 2015): each has its valley
    const sided = runRibbon(kernel, { width: dimerLines(200), fieldT: 20, massEv: polynomial(0.05), ...request });
    expect(valuesOf(sided, 'valleyWeight').some((share) => Math.abs(share - 0.5) > 0.4)).toBe(true);
  });

  it('the lowest Landau level of K lives on B in the middle of a wide strip', () => {
    // published source: F. D. M. Haldane, PRL 61, 2015 (1988); the basis is (A, B) in both valleys
    const parameters = {
      edge: walls(1),
      valleys: 'K',
      width: nm(100),
      fieldT: 10,
      kPerNm: 0,
      massEv: polynomial(0.02),
    };
    const result = runRibbon(
      kernel,
      { ...parameters, spectrum: nearest(-0.02, 1) },
      { ...extrapolated(100), states: [0] },
    );
    expectLevels(levelsOf(result), [-0.02], 0, 1e-8);
    const sum = (name: string) => valuesOf(result, name).reduce((total, value) => total + value, 0);
    expect(sum('densityA') / sum('densityB')).toBeLessThan(1e-5);
  });

  it.each([
    [40, 2 * 0.5751 * (Math.PI / 3 / 5.04199990083)],
    [41, 0],
    [42, 2 * 0.5751 * (Math.PI / 3 / 5.28795111551)],
  ])('the gap of %d dimer lines, though no k = 0 is on the axis', (lines, gap) => {
    // published source: L. Brey, H. A. Fertig, PRB 73, 235411 (2006)
    const result = runRibbon(kernel, { width: dimerLines(lines), kPerNm: range(-0.37, 0.4, 20) });
    expect(valuesOf(result, 'gapValid')).toEqual([1]);
    const error = valuesOf(result, 'gapErrorEv')[0] as number;
    expect(error).toBeLessThan(1e-10);
    expect(Math.abs((valuesOf(result, 'gapEv')[0] as number) - gap)).toBeLessThan(1e-9);
    for (const k of valuesOf(result, 'gapKPerNm')) expect(Math.abs(k)).toBeLessThan(1e-5);
    expect(valuesOf(result, 'gapIsDirect')).toEqual([1]);
    expect(valuesOf(result, 'gapAtAxisEnd')).toEqual([0]);
  });

  it('a band edge at the end of the axis is a caution', () => {
    const result = runRibbon(kernel, { width: dimerLines(40), kPerNm: range(0.1, 0.4, 7) });
    expect(valuesOf(result, 'gapAtAxisEnd')).toEqual([1]);
  });

  it('channels of an armchair ribbon count the subbands below E, spin included', () => {
    const energies = [-0.45, -0.2, 0, 0.05, 0.2, 0.3, 0.45];
    const result = runRibbon(kernel, {
      width: dimerLines(40),
      kPerNm: range(-1, 1, 41),
      energyEv: { kind: 'values', values: energies },
      spectrum: window(-0.5, 0.5),
    });
    // subband bottoms ħv|q_n| from published source as above
    const bottoms = [0.119445, 0.238891, 0.477781];
    const expected = energies.map((e) => 2 * bottoms.filter((bottom) => bottom < Math.abs(e)).length);
    expect(valuesOf(result, 'channels')).toEqual(expected);
    expect(valuesOf(result, 'channelsValid')).toEqual(energies.map(() => 1));
  });

  it('quantum-Hall channels of a zigzag strip step 1, 3, 5 per spin', () => {
    // published source: L. Brey, H. A. Fertig, PRB 73, 195408 (2006)
    const energies = [0.05, 0.12, 0.16];
    const result = runRibbon(kernel, {
      edge: zigzag,
      width: nm(80),
      fieldT: 10,
      kPerNm: range(-0.9, 0.9, 181),
      energyEv: { kind: 'values', values: energies },
      spin: { kind: 'degenerate', factor: 1 },
      spectrum: window(-0.02, 0.2),
    });
    expect(valuesOf(result, 'channels')).toEqual([1, 3, 5]);
    expect(valuesOf(result, 'channelsValid')).toEqual([1, 1, 1]);
  });

  it('thermal channels are the mean of the sharp ones over the window of ∂f/∂E', () => {
    const ribbon = { width: dimerLines(40), kPerNm: range(-1.4, 1.4, 57), spectrum: window(-0.8, 0.8) };
    const result = runRibbon(kernel, { ...ribbon, energyEv: 0.119445, temperatureK: 100 });
    // at a band bottom half of the step is open; the other steps are 14 and more k_B T away
    expect((valuesOf(result, 'channels')[0] as number) / 2).toBeCloseTo(0.5, 4);
    expect(valuesOf(result, 'channelsValid')).toEqual([1]);
  });

  it('outside the proved window nothing is claimed', () => {
    const result = runRibbon(kernel, {
      width: dimerLines(40),
      kPerNm: range(-1, 1, 41),
      energyEv: { kind: 'values', values: [0.25, 0.35] },
      spectrum: window(-0.3, 0.3),
    });
    expect(valuesOf(result, 'channelsValid')).toEqual([1, 0]);
    expect(valuesOf(result, 'channels')[1]).toBe(0);
  });

  it('spin splits every level by gμ_B B / cos ϑ', () => {
    // CODATA 2022 μ_B = 5.7883817982e-5 eV/T
    const ribbon = { edge: zigzag, valleys: 'K', width: nm(30), fieldT: 10, kPerNm: 0.1 };
    const plain = levelsOf(runRibbon(kernel, { ...ribbon, spectrum: window(-0.15, 0.15) }));
    const spin = { kind: 'zeeman', gFactor: 2, tiltDeg: 60 };
    const result = runRibbon(kernel, { ...ribbon, spin, spectrum: window(-0.16, 0.16) });
    const shift = 2 * 5.7883817982e-4;
    const split = levelsOf(result).filter(
      (level) => level > Number(plain[0]) - 0.002 && level < Number(plain.at(-1)) + 0.002,
    );
    expectLevels(
      split,
      plain.flatMap((level) => [level - shift, level + shift]).sort((x, y) => x - y),
      1e-10,
      1e-11,
    );
  });
});
