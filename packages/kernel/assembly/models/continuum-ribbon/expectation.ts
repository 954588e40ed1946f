/**
 * What vectors say: matrix elements of dH/dk, the share of valley K, densities.
 *
 *   zigzag, armchair, periodic   dH/dk = ħvτ/2 on every bond (τ = 1 for the unfolded armchair ring)
 *   infinite mass                dH/dk = ±ħvτ on the sites of S and D
 *
 * Source    H. Hellmann (1937), R. P. Feynman, Phys. Rev. 56, 340 (1939): dE/dk = ⟨z|dH/dk|z⟩; in a cluster the
 *           eigenvalues of the block of dH/dk.
 */
import { at, put } from "../../doubles";
import { Chain } from "../../solvers/chain";
import { jacobiEigenvalues } from "../../solvers/jacobi";
import { vectorLength } from "../../solvers/chain-levels";
import { mark, release, reserve } from "../../arena";
import { componentSign, Grid } from "./grid";
import { ARMCHAIR, edge, INFINITE_MASS, valleyCode, velocity, widthNm } from "./parameters";

let elementRe: f64 = 0;
let elementIm: f64 = 0;

/** ⟨a|dH/dk|b⟩ into elementRe, elementIm. */
function velocityElement(chain: Chain, valley: f64, a: usize, b: usize): void {
  const n = chain.n;
  const factor = edge == INFINITE_MASS ? velocity * valley : 0.5 * velocity * (edge == ARMCHAIR ? 1 : valley);
  let re: f64 = 0;
  let im: f64 = 0;
  if (edge == INFINITE_MASS) {
    for (let i = 0; i < n; i++) re += componentSign(i) * at(a, i) * at(b, i);
  } else if (!chain.closed) {
    for (let i = 1; i < n; i++) re += at(a, i - 1) * at(b, i) + at(a, i) * at(b, i - 1);
  } else {
    // Σ conj(a[i−1]) b[i] + conj(a[i]) b[i−1], the corner with its phase
    pairRe = 0;
    pairIm = 0;
    for (let i = 1; i < n; i++) addPair(a, b, i - 1, i);
    re = pairRe;
    im = pairIm;
    const last = n - 1;
    const ar = at(a, 0), ai = at(a, 1), br = at(b, 0), bi = at(b, 1);
    const cr = at(a, 2 * last), ci = at(a, 2 * last + 1), dr = at(b, 2 * last), di = at(b, 2 * last + 1);
    // conj(a0) e^{iθ} b[n−1] + conj(a[n−1]) e^{−iθ} b0
    const xr = chain.cosine * dr - chain.sine * di, xi = chain.cosine * di + chain.sine * dr;
    const yr = chain.cosine * br + chain.sine * bi, yi = chain.cosine * bi - chain.sine * br;
    re += ar * xr + ai * xi + cr * yr + ci * yi;
    im += ar * xi - ai * xr + cr * yi - ci * yr;
  }
  elementRe = factor * re;
  elementIm = factor * im;
}

let pairRe: f64 = 0;
let pairIm: f64 = 0;

@inline
function addPair(a: usize, b: usize, i: i32, j: i32): void {
  const ar = at(a, 2 * i), ai = at(a, 2 * i + 1), br = at(b, 2 * i), bi = at(b, 2 * i + 1);
  const cr = at(a, 2 * j), ci = at(a, 2 * j + 1), dr = at(b, 2 * j), di = at(b, 2 * j + 1);
  pairRe += ar * dr + ai * di + cr * br + ci * bi;
  pairIm += ar * di - ai * dr + cr * bi - ci * br;
}

/** dE/dk of `members` levels from vector `first` on, ascending, into velocities[first …]. False: not converged. */
export function clusterVelocities(
  chain: Chain, valley: f64, first: i32, members: i32, vectors: usize, velocities: usize,
): bool {
  const size = <usize>vectorLength(chain) << 3;
  if (members == 1) {
    velocityElement(chain, valley, vectors + <usize>first * size, vectors + <usize>first * size);
    put(velocities, first, elementRe);
    return true;
  }
  const room = mark();
  const matrix = reserve(<u64>members * <u64>members * 16);
  for (let i = 0; i < members; i++) {
    for (let j = 0; j <= i; j++) {
      velocityElement(chain, valley, vectors + <usize>(first + i) * size, vectors + <usize>(first + j) * size);
      put(matrix, 2 * (i * members + j), elementRe);
      put(matrix, 2 * (i * members + j) + 1, i == j ? 0 : elementIm);
      put(matrix, 2 * (j * members + i), elementRe);
      put(matrix, 2 * (j * members + i) + 1, i == j ? 0 : -elementIm);
    }
  }
  const done = jacobiEigenvalues(members, matrix, velocities + (<usize>first << 3));
  release(room);
  return done;
}

/** |z[i]|². */
@inline
export function weight(chain: Chain, z: usize, i: i32): f64 {
  if (!chain.closed) return at(z, i) * at(z, i);
  return at(z, 2 * i) * at(z, 2 * i) + at(z, 2 * i + 1) * at(z, 2 * i + 1);
}

/** Share of valley K: the half x > 0 of the unfolded armchair ring; the two mirror points count half. */
export function valleyShare(chain: Chain, row: i32, z: usize): f64 {
  if (edge != ARMCHAIR) return valleyCode(row) > 0 ? 1 : 0;
  const middle = chain.n / 2;
  let sum = 0.5 * (weight(chain, z, 0) + weight(chain, z, middle));
  for (let i = middle + 1; i < chain.n; i++) sum += weight(chain, z, i);
  return sum;
}

/** Positions at which densities are returned, in nm from the centre. */
export function positionCount(grid: Grid): i32 {
  return edge == ARMCHAIR ? grid.n / 2 + 1 : grid.n;
}
export function positionAt(grid: Grid, i: i32): f64 {
  const from = edge == ARMCHAIR ? 0 : grid.offset;
  return from + 0.5 * <f64>i * grid.h - 0.5 * widthNm;
}

let aRe: f64 = 0;
let aIm: f64 = 0;
let bRe: f64 = 0;
let bIm: f64 = 0;

/** Both components at site i: the one that lives there, and the mean of its two neighbours for the other. */
function componentsAt(chain: Chain, z: usize, i: i32): void {
  const n = chain.n;
  let re: f64, im: f64 = 0, otherRe: f64 = 0, otherIm: f64 = 0;
  if (!chain.closed) {
    re = at(z, i);
    if (i > 0) otherRe += 0.5 * at(z, i - 1);
    if (i + 1 < n) otherRe += 0.5 * at(z, i + 1);
  } else {
    re = at(z, 2 * i);
    im = at(z, 2 * i + 1);
    for (let side = -1; side <= 1; side += 2) {
      let j = i + side;
      let sine: f64 = 0, cosine: f64 = 1;
      if (j < 0) {
        j = n - 1;
        cosine = chain.cosine;
        sine = chain.sine;
      } else if (j == n) {
        j = 0;
        cosine = chain.cosine;
        sine = -chain.sine;
      }
      otherRe += 0.5 * (cosine * at(z, 2 * j) - sine * at(z, 2 * j + 1));
      otherIm += 0.5 * (cosine * at(z, 2 * j + 1) + sine * at(z, 2 * j));
    }
  }
  const plus = componentSign(i) > 0;
  aRe = plus ? re : otherRe;
  aIm = plus ? im : otherIm;
  bRe = plus ? otherRe : re;
  bIm = plus ? otherIm : im;
  if (edge != INFINITE_MASS) return;
  // S, D → A = (S + D)/√2, B = (S − D)/√2
  const root = Math.sqrt(0.5);
  const s = aRe, d = bRe;
  aRe = root * (s + d);
  bRe = root * (s - d);
}

/** Adds |A|² and |B|² of a unit vector, with integral 1 over the strip, times `share`, to the two rows. */
export function addDensities(chain: Chain, grid: Grid, z: usize, share: f64, a: usize, b: usize): void {
  const room = mark();
  const count = positionCount(grid);
  const here = reserve(<u64>count * 16);
  let total: f64 = 0;
  for (let i = 0; i < count; i++) {
    let da: f64 = 0, db: f64 = 0;
    if (edge == ARMCHAIR) {
      const middle = grid.n / 2;
      for (let side = 0; side < 2; side++) {
        componentsAt(chain, z, side == 0 ? (middle + i) % grid.n : middle - i);
        da += aRe * aRe + aIm * aIm;
        db += bRe * bRe + bIm * bIm;
      }
    } else {
      componentsAt(chain, z, i);
      da = aRe * aRe + aIm * aIm;
      db = bRe * bRe + bIm * bIm;
    }
    put(here, 2 * i, da);
    put(here, 2 * i + 1, db);
    const end = edge == ARMCHAIR && (i == 0 || i == count - 1);
    total += (end ? 0.25 : 0.5) * grid.h * (da + db);
  }
  for (let i = 0; i < count; i++) {
    put(a, i, at(a, i) + (share * at(here, 2 * i)) / total);
    put(b, i, at(b, i) + (share * at(here, 2 * i + 1)) / total);
  }
  release(room);
}
