import type { Json } from '@nightcone/models';
import { expect } from 'vitest';
import type { KernelInstance, KernelResult, Tables } from '../src/index.ts';
import { runJob, valuesOf } from '../testing/run-job.ts';

export type Members = { [name: string]: Json };

export const nm = (widthNm: number): Json => ({ kind: 'nm', widthNm });
export const dimerLines = (count: number): Json => ({ kind: 'dimer-lines', count });
export const polynomial = (...coefficients: number[]): Json => ({ kind: 'polynomial', coefficients });
export const window = (eMin: number, eMax: number): Json => ({ kind: 'window', eMin, eMax });
export const nearest = (energyEv: number, count: number): Json => ({ kind: 'nearest', energyEv, count });
export const values = (...list: number[]): Json => ({ kind: 'values', values: list });
export const range = (start: number, stop: number, count: number): Json => ({ kind: 'range', start, stop, count });
export const walls = (lowerSign: number, upperSign = lowerSign): Json => ({
  kind: 'infinite-mass',
  lowerSign,
  upperSign,
});
export const zigzag: Json = { kind: 'zigzag' };
export const armchair: Json = { kind: 'armchair' };
export const single = (cells: number): Members => ({ grid: { kind: 'single', cells } });
export const extrapolated = (cells: number): Members => ({ grid: { kind: 'extrapolated', cells } });

/** The fields of the check tables [C5] and [C6]: u = transverse coordinate − W/2. */
export const mixedFields: Members = {
  fieldT: 15,
  kPerNm: 0.05,
  potentialEv: polynomial(0.01, 0.002, 0.0002),
  massEv: polynomial(0.03, -0.001),
  gaugePerNm: polynomial(-0.005, 0.004),
};

export function runRibbon(
  kernel: KernelInstance,
  parameters: Members,
  numerics: Members = {},
  tables?: Tables,
): KernelResult {
  const question = { model: 'continuum-ribbon', parameters: { energyEv: 0, ...parameters }, numerics };
  return runJob(kernel, question, tables ? { tables } : {});
}

/** Levels of one row (valley·number of k + k) of a result. */
export function levelsOf(result: KernelResult, row = 0, array = 'energies'): number[] {
  const offsets = valuesOf(result, 'offsets');
  return valuesOf(result, array).slice(offsets[row], offsets[row + 1]);
}

/** Every level within max(relative·|E|, absolute) of the expected list, and as many. */
export function expectLevels(levels: number[], expected: number[], relative: number, absolute: number): void {
  expect(levels).toHaveLength(expected.length);
  levels.forEach((level, i) => {
    const wanted = expected[i] as number;
    expect(Math.abs(level - wanted), `level ${i}: ${level} against ${wanted}`).toBeLessThan(
      Math.max(relative * Math.abs(wanted), absolute),
    );
  });
}

/** Every check that applied holds, and as many levels were found as inertia proves. */
export function expectCertified(result: KernelResult, ...codes: string[]): void {
  const { numbers, checks } = result.certificate;
  expect(checks.filter(({ holds }) => !holds)).toEqual([]);
  for (const code of codes) expect(checks.map((check) => check.code)).toContain(code);
  expect(numbers.inertiaFound).toBe(numbers.inertiaWanted);
}
