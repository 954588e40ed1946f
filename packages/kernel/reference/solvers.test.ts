import fc from 'fast-check';
import { EigenvalueDecomposition, Matrix } from 'ml-matrix';
import { beforeAll, describe, expect, it } from 'vitest';
import { compileTestKernel } from '../testing/test-module.ts';

/** Solvers by themselves, through assembly/testing/solvers.ts, against closed forms and dense matrices of ml-matrix. */
interface Solvers {
  memory: WebAssembly.Memory;
  testRelease(): void;
  testReserve(bytes: number): number;
  testChain(n: number, closed: number, diagonal: number, bonds: number, theta: number): number;
  testCounts(chain: number, shifts: number, counts: number): number;
  testLevels(
    chain: number,
    first: number,
    count: number,
    guesses: number,
    values: number,
    errors: number,
    vectors: number,
    fresh: number,
  ): number;
  testVectors(
    chain: number,
    count: number,
    values: number,
    errors: number,
    vectors: number,
    fresh: number,
    residuals: number,
    cluster: number,
  ): number;
  testBand(n: number, width: number): number;
  testSetEntry(band: number, row: number, column: number, re: number, im: number): void;
  testSealBand(band: number): void;
  testBandCount(band: number, x: number): number;
  testBandWindow(
    band: number,
    lower: number,
    upper: number,
    capacity: number,
    values: number,
    vectors: number,
    residuals: number,
  ): number;
  testBandRadius(band: number, energy: number, count: number): number;
}

let solvers: Solvers;
beforeAll(async () => {
  const module = await compileTestKernel('solvers');
  const host = { progress: () => undefined, abort: () => undefined };
  solvers = (await WebAssembly.instantiate(module, { host })).exports as unknown as Solvers;
}, 120_000);

const doubles = (at: number, count: number) => new Float64Array(solvers.memory.buffer, at >>> 0, count);
const integers = (at: number, count: number) => new Int32Array(solvers.memory.buffer, at >>> 0, count);
const reserve = (count: number) => solvers.testReserve(8 * count) >>> 0;
function put(list: readonly number[]): number {
  const at = reserve(list.length);
  doubles(at, list.length).set(list);
  return at;
}

interface ChainCase {
  diagonal: number[];
  bonds: number[];
  /** Phase of the corner; undefined: an open chain. */
  theta?: number;
}

function solve({ diagonal, bonds, theta }: ChainCase, first: number, count: number, guesses?: number[]) {
  solvers.testRelease();
  const n = diagonal.length;
  const closed = theta !== undefined;
  const chain = solvers.testChain(n, closed ? 1 : 0, put(diagonal), put(bonds), theta ?? 0);
  const length = closed ? 2 * n : n;
  const [values, errors, residuals, vectors] = [
    reserve(count),
    reserve(count),
    reserve(count),
    reserve(count * length),
  ];
  const [fresh, cluster] = [reserve(count), reserve(count)];
  const guessed = guesses ? put(guesses) : 0;
  expect(solvers.testLevels(chain, first, count, guessed, values, errors, vectors, fresh)).toBe(1);
  expect(solvers.testVectors(chain, count, values, errors, vectors, fresh, residuals, cluster)).toBe(1);
  return {
    chain,
    values: [...doubles(values, count)],
    errors: [...doubles(errors, count)],
    residuals: [...doubles(residuals, count)],
    cluster: [...integers(cluster, count)],
    vectors: Array.from({ length: count }, (_, i) => [...doubles(vectors + 8 * length * i, length)]),
  };
}

const normOf = ({ diagonal, bonds }: ChainCase) =>
  diagonal.reduce((most, d, i) => {
    const row = Math.abs(d) + Math.abs(bonds[i] as number) + Math.abs(bonds[(i + 1) % bonds.length] as number);
    return Math.max(most, row);
  }, 0);

/** All levels of a Hermitian matrix from the real symmetric [[Re, −Im], [Im, Re]], where each comes twice. */
function denseLevels(n: number, entries: (re: Matrix, im: Matrix) => void): number[] {
  const re = Matrix.zeros(n, n);
  const im = Matrix.zeros(n, n);
  entries(re, im);
  const whole = Matrix.zeros(2 * n, 2 * n);
  whole.setSubMatrix(re, 0, 0).setSubMatrix(re, n, n).setSubMatrix(im, n, 0).setSubMatrix(Matrix.mul(im, -1), 0, n);
  const { realEigenvalues } = new EigenvalueDecomposition(whole, { assumeSymmetric: true });
  return realEigenvalues.sort((a, b) => a - b).filter((_, i) => i % 2 === 0);
}
function chainLevels({ diagonal, bonds, theta }: ChainCase): number[] {
  const n = diagonal.length;
  return denseLevels(n, (re, im) => {
    for (let i = 0; i < n; i++) {
      re.set(i, i, diagonal[i] as number);
      if (i > 0) re.set(i, i - 1, bonds[i] as number).set(i - 1, i, bonds[i] as number);
    }
    if (theta === undefined) return;
    const corner = bonds[0] as number;
    re.set(0, n - 1, re.get(0, n - 1) + corner * Math.cos(theta)).set(n - 1, 0, re.get(0, n - 1));
    im.set(0, n - 1, corner * Math.sin(theta)).set(n - 1, 0, -corner * Math.sin(theta));
  });
}

const uniform = (n: number, bond: number): ChainCase => ({ diagonal: Array(n).fill(0), bonds: Array(n).fill(bond) });

describe('open chains', () => {
  // closed form: 2 cos(kπ/(n+1))
  it('levels of a uniform chain', () => {
    const n = 200;
    const { values, errors } = solve(uniform(n, 1), 80, 40);
    values.forEach((value, i) => {
      const exact = 2 * Math.cos(((n - 80 - i) * Math.PI) / (n + 1));
      expect(Math.abs(value - exact)).toBeLessThan(2e-15);
      expect(errors[i]).toBeLessThan(1e-14);
    });
  });

  it('counts step by one across each level', () => {
    const n = 60;
    const { chain } = solve(uniform(n, 1), 0, 1);
    const counts = solvers.testReserve(32) >>> 0;
    for (let k = 1; k <= n; k++) {
      const level = 2 * Math.cos(((n + 1 - k) * Math.PI) / (n + 1));
      const shifts = put([level - 1e-13, level + 1e-13, ...Array(6).fill(0)]);
      expect(solvers.testCounts(chain, shifts, counts)).toBe(1);
      expect([...integers(counts, 2)]).toEqual([k - 1, k]);
    }
  });

  it('an exactly zero pivot counts right', () => {
    // d = 0 and an odd number of sites: 0 is a level, and every other pivot at x = 0 vanishes
    const { values } = solve(uniform(7, 1), 3, 1);
    expect(values).toEqual([0]);
  });

  it('wild guesses change nothing', () => {
    const chain = uniform(90, 1);
    const plain = solve(chain, 30, 12).values;
    for (const guesses of [plain.map((value) => value + 0.4), Array(12).fill(0.3), [...plain].reverse()]) {
      solve(chain, 30, 12, guesses).values.forEach((value, i) => {
        expect(Math.abs(value - (plain[i] as number))).toBeLessThan(3e-15);
      });
    }
  });
});

describe('rings', () => {
  // closed form: 2 cos((2πm + θ)/n); θ = 0 and π give pairs
  it.each([0, Math.PI, 1, -2.1])('levels of a uniform ring with phase %d', (theta) => {
    const n = 120;
    const exact = Array.from({ length: n }, (_, m) => 2 * Math.cos((2 * Math.PI * m + theta) / n)).sort(
      (a, b) => a - b,
    );
    const { values, residuals } = solve({ ...uniform(n, 1), theta }, 40, 40);
    values.forEach((value, i) => {
      expect(Math.abs(value - (exact[40 + i] as number))).toBeLessThan(5e-15);
      expect(residuals[i]).toBeLessThan(2e-13);
    });
  });

  it.each([1e-13, 1e-10, 1e-7, 1e-4])('a nearly double level at 0 split by %d is told apart', (split) => {
    // bonds a, b in turn around a ring of M cells: levels ±|a − b| at zero phase
    const cells = 64;
    const bonds = Array.from({ length: 2 * cells }, (_, i) => (i % 2 === 0 ? 1 : -1 + split));
    const { values } = solve({ diagonal: Array(2 * cells).fill(0), bonds, theta: 0 }, cells - 1, 2);
    const exact = 1 + (-1 + split);
    expect(Math.abs((values[0] as number) + exact)).toBeLessThan(2e-15);
    expect(Math.abs((values[1] as number) - exact)).toBeLessThan(2e-15);
  });

  it('many nearly separate pieces: a cluster of twenty levels keeps orthonormal vectors', () => {
    const n = 400;
    const bonds = Array.from({ length: n }, (_, i) => (i % 20 === 0 ? 1e-14 : 1));
    const { vectors, cluster, residuals } = solve({ diagonal: Array(n).fill(0), bonds, theta: 0.4 }, 180, 40);
    expect(new Set(cluster).size).toBeLessThan(6);
    expect(Math.max(...residuals)).toBeLessThan(1e-12);
    vectors.forEach((a, i) => {
      vectors.slice(0, i + 1).forEach((b, j) => {
        let re = 0;
        let im = 0;
        for (let s = 0; s < n; s++) {
          const [ar, ai, br, bi] = [a[2 * s], a[2 * s + 1], b[2 * s], b[2 * s + 1]] as [number, number, number, number];
          re += ar * br + ai * bi;
          im += ar * bi - ai * br;
        }
        expect(Math.abs(re - (i === j ? 1 : 0)) + Math.abs(im)).toBeLessThan(1e-10);
      });
    });
  });
});

describe('random chains and rings against ml-matrix', () => {
  const entry = fc.oneof(
    fc.double({ min: -1, max: 1, noNaN: true }).map((x) => (Math.abs(x) < 1e-14 ? 0 : x)),
    fc.constantFrom(0, -0, 0.5, 1e-12),
  );
  const sizes = fc.integer({ min: 2, max: 14 });
  const chains = sizes.chain((half) =>
    fc.record({
      diagonal: fc.array(entry, { minLength: 2 * half, maxLength: 2 * half }),
      bonds: fc.array(fc.oneof(entry, fc.constantFrom(0, 1e-9, -1, 1)), { minLength: 2 * half, maxLength: 2 * half }),
      theta: fc.option(fc.constantFrom(0, Math.PI, 0.3, -2), { nil: undefined }),
    }),
  );
  it('gives every level, with a proof and a residual', () => {
    fc.assert(
      fc.property(chains, ({ diagonal, bonds, theta }) => {
        const chain: ChainCase = { diagonal, bonds, ...(theta === undefined ? {} : { theta }) };
        const exact = chainLevels(chain);
        const { values, residuals } = solve(chain, 0, diagonal.length);
        // both solvers are backward stable: a few n ε ‖H‖
        const bound = 64 * diagonal.length * 2 ** -52 * (normOf(chain) + 1e-3);
        values.forEach((value, i) => {
          expect(Math.abs(value - (exact[i] as number))).toBeLessThan(bound);
          expect(residuals[i]).toBeLessThan(20 * bound);
        });
      }),
      { seed: 4, numRuns: 300 },
    );
  });
});

describe('exactly singular pieces', () => {
  // a level at 0 of an uncoupled site and one at 3.6e-13 of another: a zero pivot must not be counted twice
  it('levels of a ring that falls apart', () => {
    const diagonal = [0, -0, -0.11072173962510357, 3.644402405812065e-13, 0, -0];
    const bonds = [-0.12341352662501161, 0, -1, 0, 0, 0];
    const { values } = solve({ diagonal, bonds, theta: 0 }, 0, 6);
    const exact = [-1.0568921104168587, -0.12341352662501161, 0, 3.644402405812065e-13, 0.12341352662501161];
    exact.forEach((level, i) => {
      expect(Math.abs((values[i] as number) - level)).toBeLessThan(2e-15);
    });
  });
});

describe('band matrices', () => {
  function fill(n: number, width: number, entries: [number, number, number, number][]) {
    solvers.testRelease();
    const band = solvers.testBand(n, width);
    for (const [row, column, re, im] of entries) solvers.testSetEntry(band, row, column, re, im);
    solvers.testSealBand(band);
    return band;
  }
  function window(band: number, n: number, lower: number, upper: number) {
    const [values, residuals, vectors] = [reserve(n), reserve(n), reserve(2 * n * n)];
    const found = solvers.testBandWindow(band, lower, upper, n, values, vectors, residuals);
    return {
      found,
      values: [...doubles(values, Math.max(0, found))],
      residuals: [...doubles(residuals, Math.max(0, found))],
    };
  }
  // sixteenths: many exact degeneracies and zeros, nothing near underflow
  const entry = fc.integer({ min: -16, max: 16 }).map((n) => n / 16);
  const bands = fc.tuple(fc.integer({ min: 3, max: 22 }), fc.integer({ min: 1, max: 3 })).chain(([n, width]) =>
    fc.record({
      n: fc.constant(n),
      width: fc.constant(width),
      numbers: fc.array(fc.tuple(entry, entry), { minLength: n * (width + 1), maxLength: n * (width + 1) }),
    }),
  );

  it('window levels and counts agree with ml-matrix', () => {
    fc.assert(
      fc.property(bands, ({ n, width, numbers }) => {
        const entries: [number, number, number, number][] = [];
        for (let j = 0; j < n; j++)
          for (let d = 0; d <= width && j + d < n; d++) {
            const [re, im] = numbers[j * (width + 1) + d] as [number, number];
            entries.push([j + d, j, re, d === 0 ? 0 : im]);
          }
        const exact = denseLevels(n, (re, im) => {
          for (const [row, column, a, b] of entries) {
            re.set(row, column, a).set(column, row, a);
            if (row !== column) im.set(row, column, b).set(column, row, -b);
          }
        });
        const band = fill(n, width, entries);
        const wanted = exact.filter((level) => level >= -0.7 && level < 0.9);
        const edges = exact.some((level) => Math.min(Math.abs(level + 0.7), Math.abs(level - 0.9)) < 1e-9);
        fc.pre(!edges);
        const { found, values, residuals } = window(band, n, -0.7, 0.9);
        expect(found).toBe(wanted.length);
        values.forEach((value, i) => {
          expect(Math.abs(value - (wanted[i] as number))).toBeLessThan(1e-12);
          expect(residuals[i]).toBeLessThan(1e-12);
        });
      }),
      { seed: 9, numRuns: 150 },
    );
  });

  it('finds every copy of a level that comes sixty times', () => {
    const n = 300;
    const band = fill(
      n,
      2,
      Array.from({ length: n }, (_, i) => [i, i, (i % 5) * 0.3, 0]),
    );
    const { found, values } = window(band, n, -0.1, 0.1);
    expect(found).toBe(60);
    expect(Math.max(...values.map(Math.abs))).toBeLessThan(1e-13);
  });

  it('a radius holds as many levels as asked for, and a room too small is said', () => {
    const n = 100;
    const chain: [number, number, number, number][] = Array.from({ length: n - 1 }, (_, i) => [i + 1, i, 1, 0]);
    const band = fill(n, 1, chain);
    const radius = solvers.testBandRadius(band, 0, 10);
    const exact = Array.from({ length: n }, (_, k) => 2 * Math.cos(((k + 1) * Math.PI) / (n + 1)));
    const held = exact.filter((level) => Math.abs(level) < radius).length;
    expect(held).toBeGreaterThanOrEqual(10);
    expect(held).toBeLessThanOrEqual(16);
    const room = reserve(4 * n);
    expect(solvers.testBandWindow(band, -1, 1, 3, room, room, room)).toBe(-1);
  });
});
