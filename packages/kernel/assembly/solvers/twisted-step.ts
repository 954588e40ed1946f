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
  const pivots = workspace; // q⁺[i], later unused
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
  finish(chain, 0, f64x2.extract_lane(x0, 0), f64x2.extract_lane(gamma0, 0), <i32>f64x2.extract_lane(where0, 0), next, residual, vectors, down, up);
  finish(chain, 1, f64x2.extract_lane(x0, 1), f64x2.extract_lane(gamma0, 1), <i32>f64x2.extract_lane(where0, 1), next, residual, vectors, down, up);
  finish(chain, 2, f64x2.extract_lane(x1, 0), f64x2.extract_lane(gamma1, 0), <i32>f64x2.extract_lane(where1, 0), next, residual, vectors, down, up);
  finish(chain, 3, f64x2.extract_lane(x1, 1), f64x2.extract_lane(gamma1, 1), <i32>f64x2.extract_lane(where1, 1), next, residual, vectors, down, up);
  finish(chain, 4, f64x2.extract_lane(x2, 0), f64x2.extract_lane(gamma2, 0), <i32>f64x2.extract_lane(where2, 0), next, residual, vectors, down, up);
  finish(chain, 5, f64x2.extract_lane(x2, 1), f64x2.extract_lane(gamma2, 1), <i32>f64x2.extract_lane(where2, 1), next, residual, vectors, down, up);
  finish(chain, 6, f64x2.extract_lane(x3, 0), f64x2.extract_lane(gamma3, 0), <i32>f64x2.extract_lane(where3, 0), next, residual, vectors, down, up);
  finish(chain, 7, f64x2.extract_lane(x3, 1), f64x2.extract_lane(gamma3, 1), <i32>f64x2.extract_lane(where3, 1), next, residual, vectors, down, up);
}

/** A decaying tail ends in 0 before it becomes a row of slow subnormal numbers. */
@inline
export function flushed(z: f64): f64 {
  return Math.abs(z) < 1e-140 ? 0 : z;
}

/** The vector's norm (and the vector, if asked) outward from the twist, and the improved level. */
function finish(
  chain: Chain, lane: i32, x: f64, gamma: f64, r: i32,
  next: usize, residual: usize, vectors: usize, down: usize, up: usize,
): void {
  const n = chain.n;
  const offset = <usize>lane << 3;
  const vector = vectors != 0 ? <usize>load<u32>(vectors + (<usize>lane << 2)) : 0;
  let sum: f64 = 1;
  let z: f64 = 1;
  if (vector != 0) put(vector, r, 1);
  for (let i = r - 1; i >= 0; i--) {
    z = flushed(-z * load<f64>(down + (<usize>i << 6) + offset));
    if (vector != 0) put(vector, i, z);
    sum += z * z;
  }
  z = 1;
  for (let i = r + 1; i < n; i++) {
    z = flushed(-z * load<f64>(up + (<usize>i << 6) + offset));
    if (vector != 0) put(vector, i, z);
    sum += z * z;
  }
  put(next, lane, x + gamma / sum);
  put(residual, lane, Math.abs(gamma) / Math.sqrt(sum));
  if (vector == 0) return;
  const scale = 1 / Math.sqrt(sum);
  for (let i = 0; i < n; i++) put(vector, i, at(vector, i) * scale);
}
