/**
 * Levels of a complex Hermitian band matrix in a window or nearest to an energy, proved complete by inertia.
 *
 * The window is cut at counted shifts into pieces of at most about twelve levels; each piece is one shift-invert
 * Lanczos, repeated until the number of the inertia count is met.
 *
 * Source    band-inertia.ts, shift-invert-lanczos.ts; slicing: B. N. Parlett, The Symmetric Eigenvalue Problem
 *           (SIAM 1998) §3.3; R. G. Grimes, J. G. Lewis, H. D. Simon, SIAM J. Matrix Anal. 15 (1994) 228–272.
 * Input     a sealed band; lower < upper, room for `capacity` levels.
 * Output    values ascending, vectors (n complex entries each; orthonormal within a piece, and between pieces to the
 *           accuracy of residual over distance), residuals.
 * Accuracy  residuals ≤ 128 ε‖H‖; no level missed, none invented: the number is that of the inertia.
 * Fails     BAND_TOO_MANY when capacity is too small, BAND_GROWTH when no count can be trusted, BAND_INCOMPLETE when
 *           Lanczos does not reach the count.
 */
import { mark, release, reserve, reserveF64 } from "../arena";
import { EPSILON } from "../constants";
import { BandMatrix } from "./band-matrix";
import { countBelow, countedAt } from "./band-inertia";
import { intAt, putInt } from "./chain-brackets";
import { at, put } from "../doubles";
import { lanczosLevels } from "./shift-invert-lanczos";

export const BAND_TOO_MANY: i32 = -1;
export const BAND_GROWTH: i32 = -2;
export const BAND_INCOMPLETE: i32 = -3;

/** Levels of one Lanczos piece. */
const PIECE: i32 = 12;
const MAX_PIECES: i32 = 4096;

/** Inertia counts at the ends that the last call used (moved outward where elimination grew). */
export let lowerCounted: f64 = 0;
export let upperCounted: f64 = 0;

/** All levels with lower ≤ E < upper; the number found or a negative failure. */
export function bandWindow(
  band: BandMatrix, lower: f64, upper: f64, capacity: i32, values: usize, vectors: usize, residuals: usize,
): i32 {
  const room = mark();
  const result = window(band, lower, upper, capacity, values, vectors, residuals);
  release(room);
  return result;
}

function window(
  band: BandMatrix, lower: f64, upper: f64, capacity: i32, values: usize, vectors: usize, residuals: usize,
): i32 {
  const below = countBelow(band, lower, -1);
  lowerCounted = countedAt;
  const under = countBelow(band, upper, 1);
  upperCounted = countedAt;
  if (below < 0 || under < 0) return BAND_GROWTH;
  const size = <usize>band.n << 4;
  const edges = reserveF64(MAX_PIECES);
  const counts = reserve(<u64>MAX_PIECES * 4);
  put(edges, 0, lowerCounted);
  putInt(counts, 0, below);
  let top = 1; // stack of piece ends, the next lower end first
  put(edges, 1, upperCounted);
  putInt(counts, 1, under);
  let kept = 0;
  let low = lowerCounted;
  let lowCount = below;
  while (top >= 1) {
    const high = at(edges, top);
    const highCount = intAt(counts, top);
    const wanted = highCount - lowCount;
    const narrow = high - low <= 1e4 * EPSILON * band.norm;
    if (wanted > PIECE && !narrow && top + 1 < MAX_PIECES) {
      const middle = countBelow(band, low + 0.5031 * (high - low), 1);
      if (middle < 0) return BAND_GROWTH;
      if (countedAt > low && countedAt < high && middle >= lowCount && middle <= highCount) {
        top++;
        put(edges, top, countedAt);
        putInt(counts, top, middle);
        continue;
      }
    }
    if (wanted > 0) {
      if (kept + wanted > capacity) {
        // the outer pieces may hold levels outside the window asked for: they need room too
        return BAND_TOO_MANY;
      }
      const found = lanczosLevels(band, low, high, wanted, 0, values + (<usize>kept << 3), vectors + <usize>kept * size, residuals + (<usize>kept << 3));
      if (found != wanted) return BAND_INCOMPLETE;
      kept += found;
    }
    low = high;
    lowCount = highCount;
    top--;
  }
  // levels between the ends asked for and the ends counted
  let first = 0;
  while (first < kept && at(values, first) < lower) first++;
  while (kept > first && at(values, kept - 1) >= upper) kept--;
  if (first > 0) {
    memory.copy(values, values + (<usize>first << 3), <usize>(kept - first) << 3);
    memory.copy(residuals, residuals + (<usize>first << 3), <usize>(kept - first) << 3);
    memory.copy(vectors, vectors + <usize>first * size, <usize>(kept - first) * size);
  }
  return kept - first;
}

/**
 * A window [energy − r, energy + r) that holds at least `count` levels and few more, by inertia counts; r or a
 * negative failure. With bandWindow on it and a sort by distance one has the nearest levels.
 */
export function bandRadius(band: BandMatrix, energy: f64, count: i32): f64 {
  const whole = band.norm + Math.abs(energy);
  let low: f64 = 0;
  let high = whole * 1.001;
  for (let pass = 0; pass < 60; pass++) {
    const radius = pass == 0 ? whole * Math.min(1, (2 * <f64>count + 4) / <f64>band.n) : 0.5 * (low + high);
    const below = countBelow(band, energy - radius, -1);
    const from = countedAt;
    const under = countBelow(band, energy + radius, 1);
    if (below < 0 || under < 0) return <f64>BAND_GROWTH;
    const held = under - below;
    if (held < count) low = radius;
    else high = Math.max(radius, Math.max(energy - from, countedAt - energy));
    if (held >= count && held <= count + 6) return high;
    if (high - low <= 1e3 * EPSILON * whole) break;
  }
  return high;
}
