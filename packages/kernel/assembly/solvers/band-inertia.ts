/**
 * Inertia counts of a complex Hermitian band matrix: how many eigenvalues lie below x, for two x at once.
 *
 *   LDLᴴ of H − x without pivoting, column by column; by Sylvester's law the negative d[j] are counted.
 *
 * Source    J. J. Sylvester, Phil. Mag. 4 (1852) 138–142; B. N. Parlett, The Symmetric Eigenvalue Problem
 *           (SIAM 1998) §3.3; growth as in N. J. Higham, Accuracy and Stability (SIAM 2002) §10.
 * Input     a sealed band; shifts[2].
 * Output    counts[2] i32, growth[2]: the largest off-diagonal element met.
 * Accuracy  the exact count of a matrix within a few (width + 1) ε·growth; trusted while growth ≤ 8 n ‖H‖.
 * Cost      4 n (width + 1)² operations per shift; window of (width + 1)² entries.   Fails  never.
 */
import { mark, release, reserve } from "../arena";
import { BandMatrix, entryAt } from "./band-matrix";
import { at, put } from "../doubles";
import { intAt } from "./chain-brackets";

/** Replaces a vanishing pivot; the growth it causes discredits the count. */
const PIVOT_FLOOR: f64 = 1e-150;

export function bandCounts(band: BandMatrix, shifts: usize, counts: usize, growth: usize): void {
  const room = mark();
  const n = band.n;
  const columns = band.width + 1;
  const x = v128.load(shifts);
  // column j of the window at (j mod columns): per entry re and im of both shifts
  const window = reserve(<u64>columns * <u64>columns * 32);
  let negatives = i64x2.splat(0);
  let largest = f64x2.splat(0);
  for (let j = 0; j < min(columns - 1, n); j++) loadColumn(band, j, columns, x, window);
  for (let j = 0; j < n; j++) {
    if (j + columns - 1 < n) loadColumn(band, j + columns - 1, columns, x, window);
    const column = window + <usize>((j % columns) * columns) * 32;
    let pivot = v128.load(column);
    const floor = f64x2.splat(PIVOT_FLOOR);
    pivot = v128.bitselect(floor, pivot, f64x2.lt(f64x2.abs(pivot), floor));
    negatives = i64x2.add(negatives, i64x2.shr_u(pivot, 63));
    const inverse = f64x2.div(f64x2.splat(1), pivot);
    const reach = min(columns - 1, n - 1 - j);
    for (let a = 1; a <= reach; a++) {
      const ar = f64x2.mul(v128.load(column + <usize>a * 32), inverse);
      const ai = f64x2.mul(v128.load(column + <usize>a * 32, 16), inverse);
      const target = window + <usize>(((j + a) % columns) * columns) * 32;
      for (let c = a; c <= reach; c++) {
        // H[j+c][j+a] −= H[j+c][j] conj(H[j+a][j]) / d
        const cr = v128.load(column + <usize>c * 32);
        const ci = v128.load(column + <usize>c * 32, 16);
        const to = target + <usize>(c - a) * 32;
        const re = f64x2.sub(v128.load(to), f64x2.add(f64x2.mul(cr, ar), f64x2.mul(ci, ai)));
        v128.store(to, re);
        if (c == a) continue; // the diagonal stays real
        const im = f64x2.sub(v128.load(to, 16), f64x2.sub(f64x2.mul(ci, ar), f64x2.mul(cr, ai)));
        v128.store(to, im, 16);
        largest = f64x2.pmax(largest, f64x2.add(f64x2.abs(re), f64x2.abs(im)));
      }
    }
  }
  store<i32>(counts, <i32>i64x2.extract_lane(negatives, 0));
  store<i32>(counts, <i32>i64x2.extract_lane(negatives, 1), 4);
  v128.store(growth, largest);
  release(room);
}

@inline
function loadColumn(band: BandMatrix, j: i32, columns: i32, x: v128, window: usize): void {
  const to = window + <usize>((j % columns) * columns) * 32;
  const from = entryAt(band, j, j);
  v128.store(to, f64x2.sub(v128.load64_splat(from), x));
  v128.store(to, f64x2.splat(0), 16);
  for (let d = 1; d < columns; d++) {
    v128.store(to + <usize>d * 32, v128.load64_splat(from + (<usize>d << 4)));
    v128.store(to + <usize>d * 32, v128.load64_splat(from + (<usize>d << 4), 8), 16);
  }
}

const shifts: usize = memory.data(16, 16);
const counts: usize = memory.data(8, 16);
const growth: usize = memory.data(16, 16);

/** Where the last countBelow really counted. */
export let countedAt: f64 = 0;

/**
 * Levels below x; where the elimination grows, x moves by up to 64 fixed steps of ‖H‖/(16 n) in `direction` (±1) and
 * `countedAt` says where it ended. −1: growth everywhere.
 */
export function countBelow(band: BandMatrix, x: f64, direction: f64): i32 {
  const step = (direction * band.norm) / (16 * <f64>band.n);
  const limit = 8 * <f64>band.n * band.norm;
  for (let trial = 0; trial < 64; trial += 2) {
    put(shifts, 0, x + step * <f64>trial);
    put(shifts, 1, x + step * <f64>(trial + 1));
    bandCounts(band, shifts, counts, growth);
    for (let k = 0; k < 2; k++) {
      if (!(at(growth, k) <= limit)) continue;
      countedAt = at(shifts, k);
      return intAt(counts, k);
    }
  }
  return -1;
}
