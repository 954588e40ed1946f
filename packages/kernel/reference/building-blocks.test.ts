import { EigenvalueDecomposition, Matrix } from 'ml-matrix';
import { beforeAll, describe, expect, it } from 'vitest';
import { RECORD_MAGIC } from '../src/encode-specification.ts';
import { compileTestKernel } from '../testing/test-module.ts';

/** Exports of assembly/testing/core.ts beside the kernel's own. */
interface Parts {
  memory: WebAssembly.Memory;
  allocate(bytes: number): number;
  erfc(x: number): number;
  digammaImaginary(x: number, y: number): number;
  heapSort(values: number, n: number): void;
  realJacobi(a: number, n: number, values: number): void;
  pentadiagonalToTridiagonal(n: number, d: number, e: number, f: number): void;
  openProfile(pointer: number, length: number, from: number, to: number): number;
  valueAt(u: number): number;
  integralOver(a: number, b: number): number;
  averageOver(a: number, b: number): number;
  cubeRoot(of: number): number;
  rootCalls(): number;
}

let parts: Parts;
beforeAll(async () => {
  const instance = await WebAssembly.instantiate(await compileTestKernel('core'), {
    host: { progress: () => undefined, abort: () => undefined },
  });
  parts = instance.exports as unknown as Parts;
}, 120_000);

const doubles = (at: number, n: number) => new Float64Array(parts.memory.buffer, at >>> 0, n);
function place(values: number[]): number {
  const at = parts.allocate(8 * values.length);
  doubles(at, values.length).set(values);
  return at;
}
/** Deterministic values in −1 … 1. */
const scatter = (i: number) => ((i * 7919 + 104_729) % 2003) / 1001.5 - 1;

describe('erfc', () => {
  // published source: M. Abramowitz, I. A. Stegun, Handbook of Mathematical Functions, table 7.1 and 7.2
  it.each([
    [0, 1],
    [0.5, 0.4795001221869535],
    [1, 0.15729920705028513],
    [2, 0.004677734981047266],
    [3, 2.209049699858544e-5],
    [-1, 1.8427007929497148],
  ])('erfc(%d) = %d', (x, expected) => {
    expect(Math.abs(parts.erfc(x) / expected - 1)).toBeLessThan(1e-14);
  });
  it('is continuous where the series hands over to the fraction', () => {
    expect(Math.abs(parts.erfc(2 - 1e-12) / parts.erfc(2) - 1)).toBeLessThan(1e-11);
    expect(Math.abs(parts.erfc(4) / parts.erfc(4 + 1e-13) - 1)).toBeLessThan(1e-11);
  });
});

describe('digamma', () => {
  // published source: Abramowitz, Stegun 6.3.12 and 6.3.13, closed forms on the lines Re z = 1/2 and Re z = 1
  it.each([1e-6, 0.1, 0.7, 2, 7.9, 8.1, 50, 1e5])('has its closed forms at y = %d', (y) => {
    const half = (Math.PI / 2) * Math.tanh(Math.PI * y);
    const one = -1 / (2 * y) + Math.PI / 2 / Math.tanh(Math.PI * y);
    expect(Math.abs(parts.digammaImaginary(0.5, y) - half)).toBeLessThan(2e-15);
    expect(Math.abs(parts.digammaImaginary(1, y) - one)).toBeLessThan(2e-15 + 3e-16 / y);
  });
});

describe('bracketed root', () => {
  it.each([1e-6, 0.5, 8, 999])('finds the cube root of %d in few steps', (of) => {
    expect(Math.abs(parts.cubeRoot(of) - Math.cbrt(of))).toBeLessThan(4e-16 * 10);
    expect(parts.rootCalls()).toBeLessThan(60);
  });
});

describe('small dense matrices', () => {
  it('sorts', () => {
    const values = Array.from({ length: 257 }, (_, i) => scatter(i));
    const at = place(values);
    parts.heapSort(at, values.length);
    expect([...doubles(at, values.length)]).toEqual([...values].sort((a, b) => a - b));
  });

  it.each([1, 2, 4, 8, 16])('Jacobi agrees with an independent library at n = %d', (n) => {
    const a = Array.from({ length: n * n }, (_, i) => {
      const [row, column] = [Math.floor(i / n), i % n];
      return scatter(Math.min(row, column) * 31 + Math.max(row, column));
    });
    const at = place([...a, ...Array(n).fill(0)]);
    parts.realJacobi(at, n, at + 8 * n * n);
    const expected = new EigenvalueDecomposition(Matrix.from1DArray(n, n, a)).realEigenvalues.sort((x, y) => x - y);
    [...doubles(at + 8 * n * n, n)].forEach((value, i) => {
      // 16 ε‖A‖, ‖A‖ ≤ n
      expect(Math.abs(value - (expected[i] as number))).toBeLessThan(16 * 2.3e-16 * n);
    });
  });

  it.each([1, 2, 3, 4, 5, 12, 41])('reduces a pentadiagonal matrix of n = %d without moving its levels', (n) => {
    const d = Array.from({ length: n }, (_, i) => scatter(i));
    const e = Array.from({ length: n }, (_, i) => (i > 0 ? scatter(i + 100) : 0));
    const f = Array.from({ length: n }, (_, i) => (i > 1 ? scatter(i + 200) : 0));
    const at = place([...d, ...e, ...f]);
    parts.pentadiagonalToTridiagonal(n, at, at + 8 * n, at + 16 * n);
    const levels = (diagonal: number[], first: number[], second: number[]) => {
      const a = Matrix.zeros(n, n);
      for (let i = 0; i < n; i++) {
        a.set(i, i, diagonal[i] as number);
        for (const [reach, band] of [
          [1, first],
          [2, second],
        ] as const) {
          if (i < reach) continue;
          a.set(i, i - reach, band[i] as number);
          a.set(i - reach, i, band[i] as number);
        }
      }
      return new EigenvalueDecomposition(a).realEigenvalues.sort((x, y) => x - y);
    };
    const after = levels([...doubles(at, n)], [...doubles(at + 8 * n, n)], Array(n).fill(0));
    expect([...doubles(at + 16 * n, n)].every((value) => value === 0)).toBe(true);
    levels(d, e, f).forEach((value, i) => {
      expect(Math.abs(value - (after[i] as number))).toBeLessThan(20 * n * 2.3e-16);
    });
  });
});

describe('profiles', () => {
  function openProfile(values: number[], from = -10, to = 10): number {
    const at = parts.allocate(16 + 8 * values.length);
    const header = new Uint32Array(parts.memory.buffer, at, 4);
    header.set([RECORD_MAGIC, 1, 0, 0]);
    doubles(at + 16, values.length).set(values);
    return parts.openProfile(at, 16 + 8 * values.length, from, to);
  }

  it('none is zero', () => {
    expect(openProfile([0])).toBe(0);
    expect([parts.valueAt(3), parts.integralOver(-1, 2)]).toEqual([0, 0]);
  });

  it('a polynomial of the highest degree is integrated exactly', () => {
    const coefficients = Array.from({ length: 12 }, (_, i) => scatter(i));
    expect(openProfile([1, 12, ...coefficients])).toBe(0);
    const antiderivative = (u: number) => coefficients.reduce((sum, c, n) => sum + (c * u ** (n + 1)) / (n + 1), 0);
    expect(parts.integralOver(-0.7, 1.3)).toBeCloseTo(antiderivative(1.3) - antiderivative(-0.7), 13);
    expect(parts.integralOver(1.3, -0.7)).toBe(-parts.integralOver(-0.7, 1.3));
  });

  it('steps belong to their right side and average by their share', () => {
    expect(openProfile([2, 2, -1, 2, 3, 5, 7, 11])).toBe(0);
    expect([-2, -1, 1.9, 2].map((u) => parts.valueAt(u))).toEqual([5, 7, 7, 11]);
    expect(parts.averageOver(1.5, 2.25)).toBeCloseTo((0.5 * 7 + 0.25 * 11) / 0.75, 14);
  });

  it('a sine has its closed integral', () => {
    expect(openProfile([3, 2, 4, 0.3])).toBe(0);
    const k = Math.PI / 2;
    expect(parts.valueAt(1.2)).toBeCloseTo(2 * Math.sin(1.2 * k + 0.3), 14);
    expect(parts.integralOver(0.1, 1.7)).toBeCloseTo((2 / k) * (Math.cos(0.1 * k + 0.3) - Math.cos(1.7 * k + 0.3)), 14);
  });

  it('a table passes through its rows, never overshoots, and integrates as its pieces', () => {
    const x = [-10, -4, -1, 0, 2, 10];
    const y = [0, 0, 1, 3, 3, -2];
    expect(openProfile([4, 2, 6, ...x, ...y])).toBe(0);
    x.forEach((u, i) => {
      expect(parts.valueAt(u)).toBeCloseTo(y[i] as number, 14);
    });
    let sum = 0;
    const step = 1 / 64;
    for (let u = -10; u < 10; u += step) {
      const value = parts.valueAt(u);
      const i = x.findIndex((edge) => edge > u) - 1;
      const [low, high] = [y[i] as number, y[i + 1] as number].sort((a, b) => a - b) as [number, number];
      expect(value).toBeGreaterThanOrEqual(low - 1e-14);
      expect(value).toBeLessThanOrEqual(high + 1e-14);
      // Simpson is exact on each cubic piece, and every row lies on a step
      sum += (step / 6) * (value + 4 * parts.valueAt(u + step / 2) + parts.valueAt(u + step));
    }
    expect(parts.integralOver(-10, 10)).toBeCloseTo(sum, 12);
  });

  it('refuses tables that do not cover the width, and lists that do not increase', () => {
    expect(openProfile([4, 2, 2, -1, 1, 0, 0], -1, 1.5)).toBe(5); // outside-table
    expect(openProfile([4, 2, 2, 1, -1, 0, 0])).toBe(2); // invalid-parameter
    expect(openProfile([2, 2, 1, 1, 3, 0, 0, 0])).toBe(2);
    expect(openProfile([2, 1, 1, 3, 0, 0, 0])).toBe(2);
  });
});
