/**
 * Interior levels of a complex Hermitian band matrix by shift-invert Lanczos with locking, until a number that is
 * known beforehand (from inertia) has been found.
 *
 *   (H − σ)⁻¹ v = θ v,  λ = σ + 1/θ; Lanczos with full re-orthogonalisation, twice; converged vectors are locked and
 *   the next round starts orthogonal to them, so that every copy of a multiple level is found.
 *
 * Source    T. Ericsson, A. Ruhe, Math. Comp. 35 (1980) 1251–1268; locking: G. W. Stewart, Matrix Algorithms II
 *           (SIAM 2001) §5.2.
 * Input     a sealed band; lower ≤ λ < upper holds `wanted` levels; starts (n complex entries, 0 for none) is mixed
 *           into the first start vector.
 * Output    values[wanted] ascending, vectors[wanted] (n complex entries each, orthonormal), residuals[wanted].
 * Accuracy  residual ≤ 64·2 ε‖H‖ as measured; the window's completeness is the caller's inertia.
 * Cost      one factorisation and about 2·wanted + 20 solves.
 * Fails     number found < wanted after wanted + 12 rounds; more than wanted is never returned but reported as −1.
 */
import { mark, release, reserve, reserveF64 } from "../arena";
import { EPSILON } from "../constants";
import { addScaled, dot, fillFixed, normalise, projectOut } from "../linalg/dense-vector";
import { applyBand, BandMatrix } from "./band-matrix";
import { bandSolveBytes, factorBand, solveBand } from "./band-solve";
import { at, put } from "../doubles";
import { implicitQl } from "./implicit-ql";

/** Basis vectors of one round. */
@inline
function basisSize(n: i32, wanted: i32): i32 {
  return min(n, 2 * wanted + 24);
}

export function lanczosBytes(n: i32, width: i32, wanted: i32): u64 {
  const m = <u64>basisSize(n, wanted);
  return bandSolveBytes(n, width) + (m + 4) * <u64>n * 16 + m * m * 8 + m * 64 + 4096;
}

export function lanczosLevels(
  band: BandMatrix, lower: f64, upper: f64, wanted: i32, starts: usize, values: usize, vectors: usize, residuals: usize,
): i32 {
  if (wanted == 0) return 0;
  const room = mark();
  const n = band.n;
  const size = <usize>n << 4;
  const most = basisSize(n, wanted);
  const basis = reserve(<u64>(most + 1) * <u64>size);
  const image = reserve(size);
  const alpha = reserveF64(most);
  const beta = reserveF64(most);
  const theta = reserveF64(most);
  const work = reserveF64(most);
  const ritz = reserveF64(<u64>most * <u64>most);
  const factors = reserve(bandSolveBytes(n, band.width));
  const accepted = 128 * EPSILON * band.norm;
  // off the middle: a symmetric spectrum has a level there
  const sigma = lower + 0.4871 * (upper - lower);
  factorBand(band, sigma, factors);
  let found = 0;
  for (let round = 0; found < wanted && round < wanted + 12; round++) {
    fillFixed(2 * n, <u64>(round + 1), basis);
    normalise(2 * n, basis);
    if (round == 0 && starts != 0) addScaled(2 * n, 4, starts, basis);
    purge(n, basis, vectors, found);
    if (normalise(2 * n, basis) == 0) continue;
    const room = min(most, n - found);
    let steps = 0;
    let enough = false;
    while (steps < room && !enough) {
      const v = basis + <usize>steps * size;
      const w = v + size;
      memory.copy(w, v, size);
      solveBand(band, factors, w);
      put(alpha, steps, dot(2 * n, v, w));
      for (let twice = 0; twice < 2; twice++) {
        purge(n, w, vectors, found);
        purge(n, w, basis, steps + 1);
      }
      put(beta, steps, normalise(2 * n, w));
      steps++;
      // an invariant subspace ends the round; otherwise look every eighth step
      const closed = at(beta, steps - 1) <= EPSILON * Math.abs(at(alpha, 0));
      if (!closed && steps < room && (steps < wanted - found + 6 || (steps & 7) != 0)) continue;
      memory.copy(theta, alpha, <usize>steps << 3);
      memory.copy(work, beta, <usize>steps << 3);
      if (!implicitQl(steps, theta, work, ritz)) break;
      enough = closed || allConverged(steps, theta, ritz, at(beta, steps - 1), sigma, lower, upper, wanted - found, band.norm);
    }
    const before = found;
    for (let k = 0; k < steps && found <= wanted; k++) {
      if (at(theta, k) == 0) continue;
      const level = sigma + 1 / at(theta, k);
      if (!(level >= lower && level < upper)) continue;
      const z = found < wanted ? vectors + <usize>found * size : image;
      memory.fill(z, 0, size);
      for (let i = 0; i < steps; i++) addScaled(2 * n, at(ritz, i * steps + k), basis + <usize>i * size, z);
      purge(n, z, vectors, found);
      if (normalise(2 * n, z) < 0.5) continue;
      if (found == wanted) {
        // one more than inertia allows: only if it is a true level
        if (rayleigh(band, z, w0(basis, most, size)) <= accepted && quotient >= lower && quotient < upper) found++;
        continue;
      }
      let residual = rayleigh(band, z, image);
      for (let polish = 0; polish < 2 && residual > accepted && residual < 1e-3 * band.norm; polish++) {
        // a Ritz vector that is nearly there: one more inverse step removes the far components
        solveBand(band, factors, z);
        purge(n, z, vectors, found);
        normalise(2 * n, z);
        residual = rayleigh(band, z, image);
      }
      if (!(residual <= accepted) || !(quotient >= lower && quotient < upper)) continue;
      put(values, found, quotient);
      put(residuals, found, residual);
      found++;
    }
    if (found == before && round > 6) break;
  }
  release(room);
  if (found > wanted) return -1;
  sortLevels(found, size, values, vectors, residuals);
  return found;
}

@inline
function w0(basis: usize, most: i32, size: usize): usize {
  return basis + <usize>most * size;
}

/** y −= Σ ⟨x_i|y⟩ x_i over `count` unit vectors. */
function purge(n: i32, y: usize, x: usize, count: i32): void {
  const size = <usize>n << 4;
  for (let i = 0; i < count; i++) projectOut(n, x + <usize>i * size, y);
}

let quotient: f64 = 0;

/** Rayleigh quotient of a unit z into `quotient`; answers ‖H z − quotient z‖. */
function rayleigh(band: BandMatrix, z: usize, image: usize): f64 {
  applyBand(band, z, image);
  quotient = dot(2 * band.n, z, image);
  addScaled(2 * band.n, -quotient, z, image);
  return Math.sqrt(dot(2 * band.n, image, image));
}

/** Whether all Ritz values inside the window have converged and there are as many as are still wanted. */
function allConverged(
  steps: i32, theta: usize, ritz: usize, beta: f64, sigma: f64, lower: f64, upper: f64, wanted: i32, norm: f64,
): bool {
  let inside = 0;
  for (let k = 0; k < steps; k++) {
    const t = at(theta, k);
    if (t == 0) continue;
    const level = sigma + 1 / t;
    if (!(level >= lower && level < upper)) continue;
    // error of the level: β|s| / θ²
    if (beta * Math.abs(at(ritz, (steps - 1) * steps + k)) > 8 * EPSILON * norm * t * t) return false;
    inside++;
  }
  return inside >= wanted;
}

/** Insertion sort of values with their vectors and residuals. */
function sortLevels(count: i32, size: usize, values: usize, vectors: usize, residuals: usize): void {
  const room = mark();
  const spare = reserve(size);
  for (let i = 1; i < count; i++) {
    for (let k = i; k > 0 && at(values, k) < at(values, k - 1); k--) {
      const value = at(values, k), residual = at(residuals, k);
      put(values, k, at(values, k - 1));
      put(residuals, k, at(residuals, k - 1));
      put(values, k - 1, value);
      put(residuals, k - 1, residual);
      const a = vectors + <usize>k * size, b = a - size;
      memory.copy(spare, a, size);
      memory.copy(a, b, size);
      memory.copy(b, spare, size);
    }
  }
  release(room);
}
