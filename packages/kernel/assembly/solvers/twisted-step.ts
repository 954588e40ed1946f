/**
 * Twisted factorisations of an open chain at eight shifts at once: one step of Rayleigh-quotient iteration each.
 *
 *   q⁺ from the top, q⁻ from the bottom, γ[i] = q⁺[i] + q⁻[i] − (d[i] − x); r = the row of the smallest |γ|;
 *   z[r] = 1, z[i−1] = −(b[i]/q⁺[i−1]) z[i], z[i+1] = −(b[i+1]/q⁻[i+1]) z[i];  (T − x) z = γ[r] e[r],
 *   so the Rayleigh quotient of z is x + γ[r]/‖z‖² and its residual at x is |γ[r]|/‖z‖.
 *
 * Source    K. V. Fernando, SIAM J. Matrix Anal. 18 (1997) 1013–1034; B. N. Parlett, I. S. Dhillon, Linear Algebra
 *           Appl. 267 (1997) 247–279.
 * Input     an open chain; shifts[8]; vectors: 8 addresses of n doubles in a u32 list, or 0 for none at that place;
 *           workspace of twistedBytes(n).
 * Output    next[8] (improved levels), residual[8], counts[8] i32 (levels below the shift, free of charge);
 *           unit vectors where asked.
 * Accuracy  Near an isolated level the error of `next` is cubic in that of the shift; |z| elementwise to relative
 *           errors of order n ε for isolated levels.
 * Cost      16 n divisions and 40 n multiplications in four f64x2 chains.   Fails  never; a step may be useless far
 *           from a level, which the caller sees from the bracket.
 */
import { Chain } from "./chain";
import { at, put } from "../doubles";
import { storeCounts } from "./sturm-count";

export function twistedBytes(n: i32): u64 {
  return <u64>n * 64 * 3;
}

/** Replaces a zero pivot: its quotients stay finite, and the level it hides lies within 1e-200 of the shift. */
const PIVOT_FLOOR: f64 = 1e-200;

@inline
function guard(q: v128): v128 {
  return v128.bitselect(f64x2.splat(PIVOT_FLOOR), q, f64x2.lt(f64x2.abs(q), f64x2.splat(PIVOT_FLOOR)));
}

export function twistedStep(
  chain: Chain, shifts: usize, next: usize, residual: usize, counts: usize, vectors: usize, workspace: usize,
): void {
  const n = chain.n;
  const d = chain.diagonal;
  const b = chain.bonds;
  const block = <usize>n * 64;
  const pivots = workspace; // q⁺[i], then the vectors
  const down = workspace + block; // b[i+1]/q⁺[i], multiplier from site i+1 to i
  const up = down + block; // b[i]/q⁻[i], multiplier from site i−1 to i
  const x0 = v128.load(shifts, 0);
  let m0 = f64x2.splat(0);
  let c0 = i64x2.splat(0);
  const x1 = v128.load(shifts, 16);
  let m1 = f64x2.splat(0);
  let c1 = i64x2.splat(0);
  const x2 = v128.load(shifts, 32);
  let m2 = f64x2.splat(0);
  let c2 = i64x2.splat(0);
  const x3 = v128.load(shifts, 48);
  let m3 = f64x2.splat(0);
  let c3 = i64x2.splat(0);
  for (let i = 0; i < n; i++) {
    const row = <usize>i << 6;
    const diagonal = f64x2.splat(at(d, i));
    const before = f64x2.splat(at(b, i)); // b[0] = 0
    const after = f64x2.splat(i + 1 < n ? at(b, i + 1) : 0);
    const q0 = guard(f64x2.sub(f64x2.sub(diagonal, x0), f64x2.mul(before, m0)));
    v128.store(pivots + row, q0, 0);
    c0 = i64x2.add(c0, i64x2.shr_u(q0, 63));
    const q1 = guard(f64x2.sub(f64x2.sub(diagonal, x1), f64x2.mul(before, m1)));
    v128.store(pivots + row, q1, 16);
    c1 = i64x2.add(c1, i64x2.shr_u(q1, 63));
    const q2 = guard(f64x2.sub(f64x2.sub(diagonal, x2), f64x2.mul(before, m2)));
    v128.store(pivots + row, q2, 32);
    c2 = i64x2.add(c2, i64x2.shr_u(q2, 63));
    const q3 = guard(f64x2.sub(f64x2.sub(diagonal, x3), f64x2.mul(before, m3)));
    v128.store(pivots + row, q3, 48);
    c3 = i64x2.add(c3, i64x2.shr_u(q3, 63));
    m0 = f64x2.div(after, q0);
    v128.store(down + row, m0, 0);
    m1 = f64x2.div(after, q1);
    v128.store(down + row, m1, 16);
    m2 = f64x2.div(after, q2);
    v128.store(down + row, m2, 32);
    m3 = f64x2.div(after, q3);
    v128.store(down + row, m3, 48);
  }
  storeCounts(counts, c0, c1, c2, c3);
  m0 = f64x2.splat(0);
  let best0 = f64x2.splat(Infinity);
  let gamma0 = f64x2.splat(0);
  let where0 = f64x2.splat(0);
  m1 = f64x2.splat(0);
  let best1 = f64x2.splat(Infinity);
  let gamma1 = f64x2.splat(0);
  let where1 = f64x2.splat(0);
  m2 = f64x2.splat(0);
  let best2 = f64x2.splat(Infinity);
  let gamma2 = f64x2.splat(0);
  let where2 = f64x2.splat(0);
  m3 = f64x2.splat(0);
  let best3 = f64x2.splat(Infinity);
  let gamma3 = f64x2.splat(0);
  let where3 = f64x2.splat(0);
  for (let i = n - 1; i >= 0; i--) {
    const row = <usize>i << 6;
    const diagonal = f64x2.splat(at(d, i));
    const before = f64x2.splat(at(b, i));
    const after = f64x2.splat(i + 1 < n ? at(b, i + 1) : 0);
    const index = f64x2.splat(<f64>i);
    const t0 = f64x2.mul(after, m0); // (d − x) − q⁻
    const q0 = guard(f64x2.sub(f64x2.sub(diagonal, x0), t0));
    const y0 = f64x2.sub(v128.load(pivots + row, 0), t0);
    const less0 = f64x2.lt(f64x2.abs(y0), best0);
    best0 = v128.bitselect(f64x2.abs(y0), best0, less0);
    gamma0 = v128.bitselect(y0, gamma0, less0);
    where0 = v128.bitselect(index, where0, less0);
    const t1 = f64x2.mul(after, m1); // (d − x) − q⁻
    const q1 = guard(f64x2.sub(f64x2.sub(diagonal, x1), t1));
    const y1 = f64x2.sub(v128.load(pivots + row, 16), t1);
    const less1 = f64x2.lt(f64x2.abs(y1), best1);
    best1 = v128.bitselect(f64x2.abs(y1), best1, less1);
    gamma1 = v128.bitselect(y1, gamma1, less1);
    where1 = v128.bitselect(index, where1, less1);
    const t2 = f64x2.mul(after, m2); // (d − x) − q⁻
    const q2 = guard(f64x2.sub(f64x2.sub(diagonal, x2), t2));
    const y2 = f64x2.sub(v128.load(pivots + row, 32), t2);
    const less2 = f64x2.lt(f64x2.abs(y2), best2);
    best2 = v128.bitselect(f64x2.abs(y2), best2, less2);
    gamma2 = v128.bitselect(y2, gamma2, less2);
    where2 = v128.bitselect(index, where2, less2);
    const t3 = f64x2.mul(after, m3); // (d − x) − q⁻
    const q3 = guard(f64x2.sub(f64x2.sub(diagonal, x3), t3));
    const y3 = f64x2.sub(v128.load(pivots + row, 48), t3);
    const less3 = f64x2.lt(f64x2.abs(y3), best3);
    best3 = v128.bitselect(f64x2.abs(y3), best3, less3);
    gamma3 = v128.bitselect(y3, gamma3, less3);
    where3 = v128.bitselect(index, where3, less3);
    m0 = f64x2.div(before, q0);
    v128.store(up + row, m0, 0);
    m1 = f64x2.div(before, q1);
    v128.store(up + row, m1, 16);
    m2 = f64x2.div(before, q2);
    v128.store(up + row, m2, 32);
    m3 = f64x2.div(before, q3);
    v128.store(up + row, m3, 48);
  }
  v128.store(gammas, gamma0, 0);
  v128.store(rows, where0, 0);
  v128.store(gammas, gamma1, 16);
  v128.store(rows, where1, 16);
  v128.store(gammas, gamma2, 32);
  v128.store(rows, where2, 32);
  v128.store(gammas, gamma3, 48);
  v128.store(rows, where3, 48);
  outward(n, pivots, down, up);
  finish(n, shifts, next, residual, vectors, pivots);
}

const gammas: usize = memory.data(64, 16);
const rows: usize = memory.data(64, 16);
const norms: usize = memory.data(64, 16);

/** A decaying tail ends in 0 before it becomes a row of slow subnormal numbers: clears |z| below 1e-146. */
@inline
function flush(z: v128): v128 {
  const tiny = f64x2.splat(1e-130);
  return f64x2.sub(f64x2.add(z, tiny), tiny);
}

/** All eight vectors from their twists to both ends, in place of the pivots, and their squared norms. */
function outward(n: i32, z: usize, down: usize, up: usize): void {
  const one = f64x2.splat(1);
  const r0 = v128.load(rows, 0);
  let z0 = f64x2.splat(0);
  let n0 = f64x2.splat(0);
  const r1 = v128.load(rows, 16);
  let z1 = f64x2.splat(0);
  let n1 = f64x2.splat(0);
  const r2 = v128.load(rows, 32);
  let z2 = f64x2.splat(0);
  let n2 = f64x2.splat(0);
  const r3 = v128.load(rows, 48);
  let z3 = f64x2.splat(0);
  let n3 = f64x2.splat(0);
  for (let i = n - 1; i >= 0; i--) {
    const row = <usize>i << 6;
    const index = f64x2.splat(<f64>i);
    z0 = flush(f64x2.neg(f64x2.mul(z0, v128.load(down + row, 0))));
    z0 = v128.bitselect(one, z0, f64x2.eq(index, r0));
    n0 = f64x2.add(n0, f64x2.mul(z0, z0));
    v128.store(z + row, z0, 0);
    z1 = flush(f64x2.neg(f64x2.mul(z1, v128.load(down + row, 16))));
    z1 = v128.bitselect(one, z1, f64x2.eq(index, r1));
    n1 = f64x2.add(n1, f64x2.mul(z1, z1));
    v128.store(z + row, z1, 16);
    z2 = flush(f64x2.neg(f64x2.mul(z2, v128.load(down + row, 32))));
    z2 = v128.bitselect(one, z2, f64x2.eq(index, r2));
    n2 = f64x2.add(n2, f64x2.mul(z2, z2));
    v128.store(z + row, z2, 32);
    z3 = flush(f64x2.neg(f64x2.mul(z3, v128.load(down + row, 48))));
    z3 = v128.bitselect(one, z3, f64x2.eq(index, r3));
    n3 = f64x2.add(n3, f64x2.mul(z3, z3));
    v128.store(z + row, z3, 48);
  }
  z0 = f64x2.splat(0);
  z1 = f64x2.splat(0);
  z2 = f64x2.splat(0);
  z3 = f64x2.splat(0);
  for (let i = 0; i < n; i++) {
    const row = <usize>i << 6;
    const index = f64x2.splat(<f64>i);
    z0 = flush(f64x2.neg(f64x2.mul(z0, v128.load(up + row, 0))));
    n0 = f64x2.add(n0, f64x2.mul(z0, z0));
    v128.store(z + row, f64x2.add(v128.load(z + row, 0), z0), 0);
    z0 = v128.bitselect(one, z0, f64x2.eq(index, r0));
    z1 = flush(f64x2.neg(f64x2.mul(z1, v128.load(up + row, 16))));
    n1 = f64x2.add(n1, f64x2.mul(z1, z1));
    v128.store(z + row, f64x2.add(v128.load(z + row, 16), z1), 16);
    z1 = v128.bitselect(one, z1, f64x2.eq(index, r1));
    z2 = flush(f64x2.neg(f64x2.mul(z2, v128.load(up + row, 32))));
    n2 = f64x2.add(n2, f64x2.mul(z2, z2));
    v128.store(z + row, f64x2.add(v128.load(z + row, 32), z2), 32);
    z2 = v128.bitselect(one, z2, f64x2.eq(index, r2));
    z3 = flush(f64x2.neg(f64x2.mul(z3, v128.load(up + row, 48))));
    n3 = f64x2.add(n3, f64x2.mul(z3, z3));
    v128.store(z + row, f64x2.add(v128.load(z + row, 48), z3), 48);
    z3 = v128.bitselect(one, z3, f64x2.eq(index, r3));
  }
  v128.store(norms, n0, 0);
  v128.store(norms, n1, 16);
  v128.store(norms, n2, 32);
  v128.store(norms, n3, 48);
}

/** Improved levels, residuals, and the unit vectors that were asked for. */
function finish(n: i32, shifts: usize, next: usize, residual: usize, vectors: usize, z: usize): void {
  for (let lane = 0; lane < 8; lane++) {
    const sum = at(norms, lane);
    const gamma = at(gammas, lane);
    put(next, lane, at(shifts, lane) + gamma / sum);
    put(residual, lane, Math.abs(gamma) / Math.sqrt(sum));
    const vector = vectors != 0 ? <usize>load<u32>(vectors + (<usize>lane << 2)) : 0;
    if (vector == 0) continue;
    const scale = 1 / Math.sqrt(sum);
    const from = z + (<usize>lane << 3);
    for (let i = 0; i < n; i++) put(vector, i, load<f64>(from + (<usize>i << 6)) * scale);
  }
}
