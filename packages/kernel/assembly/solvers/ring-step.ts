/**
 * Twisted block factorisations of a ring at eight shifts at once: one step of Rayleigh-quotient iteration each.
 *
 * On the folded ring of ring-count.ts, forward blocks D⁺[i] = [p, c e^{iθ}; ·, s] from the corner and backward blocks
 * D⁻[i] = [P, C; C, S] (C real) from the middle bond meet in Γ[i] = D⁺[i] + D⁻[i] − (A[i] − x). With γ the smaller
 * eigenvalue of Γ[r] and v its unit vector, z[r] = v, z[i−1] = −D⁺[i−1]⁻¹ B z[i], z[i+1] = −D⁻[i+1]⁻¹ B z[i] gives
 * (H − x) z = γ v at block r and 0 elsewhere: the Rayleigh quotient is x + γ/‖z‖², the residual at x |γ|/‖z‖. Above r
 * everything is real in (z, e^{iθ} z'), below in (z, z').
 *
 * A ring has levels of multiplicity two. For such a pair both eigenvalues of Γ are small; mode PAIR_FIRST / PAIR_SECOND
 * takes r where the larger of the two is smallest and follows its first / second eigenvector: two independent vectors.
 *
 * Source    block form of the method of twisted-step.ts, own derivation (above).
 * Input     a closed chain; k, the fold to use; shifts[8]; modes[8] i32; vectors: 8 addresses of 2n doubles (re, im per site) in a u32
 *           list, 0 for none; workspace of ringStepBytes(n).
 * Output    next[8], residual[8]; unit vectors where asked.
 * Accuracy  as twisted-step.ts while the elimination does not grow; the caller measures the true residual.
 * Cost      about 9 n divisions or roots, four f64x2 chains.   Fails  never.
 */
import { Chain, foldCorner, foldMiddle, foldOf, foldStart } from "./chain";
import { at, put } from "../doubles";
import { DETERMINANT_FLOOR, FLUSH, FOLD_BYTES } from "./ring-count";
import { flushed } from "./twisted-step";

export const LONE: i32 = 0;
export const PAIR_FIRST: i32 = 1;
export const PAIR_SECOND: i32 = 2;

/** Per block: p, s, c of D⁺ for eight lanes, then P, S, C of D⁻. */
const BLOCK_BYTES: usize = 6 * 64;

export function ringStepBytes(n: i32): u64 {
  return (<u64>n / 2) * BLOCK_BYTES;
}

@inline
function guard(det: v128): v128 {
  const floor = f64x2.splat(DETERMINANT_FLOOR);
  return v128.bitselect(floor, det, f64x2.lt(f64x2.abs(det), floor));
}

@inline
function flush(c: v128): v128 {
  const tiny = f64x2.splat(FLUSH);
  return f64x2.sub(f64x2.add(c, tiny), tiny);
}

const bestOf: usize = memory.data(64, 16);
const whereOf: usize = memory.data(64, 16);

export function ringStep(
  chain: Chain, k: i32, shifts: usize, modes: usize, next: usize, residual: usize, vectors: usize, workspace: usize,
): void {
  const blocks = chain.n / 2;
  const fold = foldOf(chain, k);
  forward(fold, foldCorner(chain, k), blocks, shifts, workspace);
  backward(fold, foldMiddle(chain, k), blocks, shifts, workspace);
  for (let lane = 0; lane < 8; lane++) bestRow(chain, fold, blocks, lane, at(shifts, lane), load<i32>(modes + (<usize>lane << 2)) != LONE, workspace);
  for (let lane = 0; lane < 8; lane++) finish(chain, fold, foldStart(chain, k), blocks, lane, at(shifts, lane), load<i32>(modes + (<usize>lane << 2)), next, residual, vectors, workspace);
}

function forward(fold: usize, corner: f64, blocks: i32, shifts: usize, workspace: usize): void {
  const one = f64x2.splat(1);
  let from = fold;
  let to = workspace;
  const x0 = v128.load(shifts, 0);
  let p0 = f64x2.sub(f64x2.splat(load<f64>(from)), x0);
  let s0 = f64x2.sub(f64x2.splat(load<f64>(from, 8)), x0);
  let c0 = f64x2.splat(corner);
  const x1 = v128.load(shifts, 16);
  let p1 = f64x2.sub(f64x2.splat(load<f64>(from)), x1);
  let s1 = f64x2.sub(f64x2.splat(load<f64>(from, 8)), x1);
  let c1 = f64x2.splat(corner);
  const x2 = v128.load(shifts, 32);
  let p2 = f64x2.sub(f64x2.splat(load<f64>(from)), x2);
  let s2 = f64x2.sub(f64x2.splat(load<f64>(from, 8)), x2);
  let c2 = f64x2.splat(corner);
  const x3 = v128.load(shifts, 48);
  let p3 = f64x2.sub(f64x2.splat(load<f64>(from)), x3);
  let s3 = f64x2.sub(f64x2.splat(load<f64>(from, 8)), x3);
  let c3 = f64x2.splat(corner);
  for (let i = 0; ; ) {
    v128.store(to, p0, 0);
    v128.store(to, s0, 64);
    v128.store(to, c0, 128);
    v128.store(to, p1, 16);
    v128.store(to, s1, 80);
    v128.store(to, c1, 144);
    v128.store(to, p2, 32);
    v128.store(to, s2, 96);
    v128.store(to, c2, 160);
    v128.store(to, p3, 48);
    v128.store(to, s3, 112);
    v128.store(to, c3, 176);
    if (++i == blocks) break;
    to += BLOCK_BYTES;
    from += FOLD_BYTES;
    const a = v128.load64_splat(from, 0);
    const b = v128.load64_splat(from, 8);
    const e2 = v128.load64_splat(from, 16);
    const f2 = v128.load64_splat(from, 24);
    const ef = v128.load64_splat(from, 32);
    const r0 = f64x2.div(one, guard(f64x2.sub(f64x2.mul(p0, s0), f64x2.mul(c0, c0))));
    const r1 = f64x2.div(one, guard(f64x2.sub(f64x2.mul(p1, s1), f64x2.mul(c1, c1))));
    const r2 = f64x2.div(one, guard(f64x2.sub(f64x2.mul(p2, s2), f64x2.mul(c2, c2))));
    const r3 = f64x2.div(one, guard(f64x2.sub(f64x2.mul(p3, s3), f64x2.mul(c3, c3))));
    const t0 = f64x2.mul(p0, r0);
    p0 = f64x2.sub(f64x2.sub(a, x0), f64x2.mul(e2, f64x2.mul(s0, r0)));
    s0 = f64x2.sub(f64x2.sub(b, x0), f64x2.mul(f2, t0));
    c0 = flush(f64x2.mul(ef, f64x2.mul(c0, r0)));
    const t1 = f64x2.mul(p1, r1);
    p1 = f64x2.sub(f64x2.sub(a, x1), f64x2.mul(e2, f64x2.mul(s1, r1)));
    s1 = f64x2.sub(f64x2.sub(b, x1), f64x2.mul(f2, t1));
    c1 = flush(f64x2.mul(ef, f64x2.mul(c1, r1)));
    const t2 = f64x2.mul(p2, r2);
    p2 = f64x2.sub(f64x2.sub(a, x2), f64x2.mul(e2, f64x2.mul(s2, r2)));
    s2 = f64x2.sub(f64x2.sub(b, x2), f64x2.mul(f2, t2));
    c2 = flush(f64x2.mul(ef, f64x2.mul(c2, r2)));
    const t3 = f64x2.mul(p3, r3);
    p3 = f64x2.sub(f64x2.sub(a, x3), f64x2.mul(e2, f64x2.mul(s3, r3)));
    s3 = f64x2.sub(f64x2.sub(b, x3), f64x2.mul(f2, t3));
    c3 = flush(f64x2.mul(ef, f64x2.mul(c3, r3)));
  }
}

function backward(fold: usize, middle: f64, blocks: i32, shifts: usize, workspace: usize): void {
  const one = f64x2.splat(1);
  let from = fold + <usize>(blocks - 1) * FOLD_BYTES;
  let to = workspace + <usize>(blocks - 1) * BLOCK_BYTES;
  const x0 = v128.load(shifts, 0);
  let p0 = f64x2.sub(f64x2.splat(load<f64>(from)), x0);
  let s0 = f64x2.sub(f64x2.splat(load<f64>(from, 8)), x0);
  let c0 = f64x2.splat(middle);
  const x1 = v128.load(shifts, 16);
  let p1 = f64x2.sub(f64x2.splat(load<f64>(from)), x1);
  let s1 = f64x2.sub(f64x2.splat(load<f64>(from, 8)), x1);
  let c1 = f64x2.splat(middle);
  const x2 = v128.load(shifts, 32);
  let p2 = f64x2.sub(f64x2.splat(load<f64>(from)), x2);
  let s2 = f64x2.sub(f64x2.splat(load<f64>(from, 8)), x2);
  let c2 = f64x2.splat(middle);
  const x3 = v128.load(shifts, 48);
  let p3 = f64x2.sub(f64x2.splat(load<f64>(from)), x3);
  let s3 = f64x2.sub(f64x2.splat(load<f64>(from, 8)), x3);
  let c3 = f64x2.splat(middle);
  for (let i = blocks - 1; ; ) {
    v128.store(to, p0, 192);
    v128.store(to, s0, 256);
    v128.store(to, c0, 320);
    v128.store(to, p1, 208);
    v128.store(to, s1, 272);
    v128.store(to, c1, 336);
    v128.store(to, p2, 224);
    v128.store(to, s2, 288);
    v128.store(to, c2, 352);
    v128.store(to, p3, 240);
    v128.store(to, s3, 304);
    v128.store(to, c3, 368);
    if (i-- == 0) break;
    const e2 = v128.load64_splat(from, 16);
    const f2 = v128.load64_splat(from, 24);
    const ef = v128.load64_splat(from, 32);
    to -= BLOCK_BYTES;
    from -= FOLD_BYTES;
    const a = v128.load64_splat(from, 0);
    const b = v128.load64_splat(from, 8);
    const r0 = f64x2.div(one, guard(f64x2.sub(f64x2.mul(p0, s0), f64x2.mul(c0, c0))));
    const r1 = f64x2.div(one, guard(f64x2.sub(f64x2.mul(p1, s1), f64x2.mul(c1, c1))));
    const r2 = f64x2.div(one, guard(f64x2.sub(f64x2.mul(p2, s2), f64x2.mul(c2, c2))));
    const r3 = f64x2.div(one, guard(f64x2.sub(f64x2.mul(p3, s3), f64x2.mul(c3, c3))));
    const t0 = f64x2.mul(p0, r0);
    p0 = f64x2.sub(f64x2.sub(a, x0), f64x2.mul(e2, f64x2.mul(s0, r0)));
    s0 = f64x2.sub(f64x2.sub(b, x0), f64x2.mul(f2, t0));
    c0 = flush(f64x2.mul(ef, f64x2.mul(c0, r0)));
    const t1 = f64x2.mul(p1, r1);
    p1 = f64x2.sub(f64x2.sub(a, x1), f64x2.mul(e2, f64x2.mul(s1, r1)));
    s1 = f64x2.sub(f64x2.sub(b, x1), f64x2.mul(f2, t1));
    c1 = flush(f64x2.mul(ef, f64x2.mul(c1, r1)));
    const t2 = f64x2.mul(p2, r2);
    p2 = f64x2.sub(f64x2.sub(a, x2), f64x2.mul(e2, f64x2.mul(s2, r2)));
    s2 = f64x2.sub(f64x2.sub(b, x2), f64x2.mul(f2, t2));
    c2 = flush(f64x2.mul(ef, f64x2.mul(c2, r2)));
    const t3 = f64x2.mul(p3, r3);
    p3 = f64x2.sub(f64x2.sub(a, x3), f64x2.mul(e2, f64x2.mul(s3, r3)));
    s3 = f64x2.sub(f64x2.sub(b, x3), f64x2.mul(f2, t3));
    c3 = flush(f64x2.mul(ef, f64x2.mul(c3, r3)));
  }
}

// Γ of one block and lane, unpacked by `meet`
let gammaP: f64 = 0;
let gammaS: f64 = 0;
let gammaRe: f64 = 0;
let gammaIm: f64 = 0;
/** Eigenvalues of Γ: the smaller and the larger in absolute value. */
let small: f64 = 0;
let large: f64 = 0;

@inline
function meet(chain: Chain, fold: usize, i: i32, lane: i32, x: f64, workspace: usize): void {
  const q = workspace + <usize>i * BLOCK_BYTES + (<usize>lane << 3);
  const c = load<f64>(q, 128);
  const folded = fold + <usize>i * FOLD_BYTES;
  gammaP = load<f64>(q) + load<f64>(q, 192) - (load<f64>(folded) - x);
  gammaS = load<f64>(q, 64) + load<f64>(q, 256) - (load<f64>(folded, 8) - x);
  gammaRe = c * chain.cosine + load<f64>(q, 320);
  gammaIm = c * chain.sine;
  const coupling = gammaRe * gammaRe + gammaIm * gammaIm;
  const sum = gammaP + gammaS;
  const difference = gammaP - gammaS;
  const root = Math.sqrt(difference * difference + 4 * coupling);
  large = 0.5 * (sum + (sum < 0 ? -root : root));
  small = large != 0 ? (gammaP * gammaS - coupling) / large : 0;
}

function bestRow(chain: Chain, fold: usize, blocks: i32, lane: i32, x: f64, pair: bool, workspace: usize): void {
  let best = Infinity;
  let where = 0;
  for (let i = 0; i < blocks; i++) {
    meet(chain, fold, i, lane, x, workspace);
    const size = Math.abs(pair ? large : small);
    if (size < best) {
      best = size;
      where = i;
    }
  }
  put(bestOf, lane, best);
  put(whereOf, lane, <f64>where);
}

function finish(
  chain: Chain, fold: usize, start: i32, blocks: i32, lane: i32, x: f64, mode: i32,
  next: usize, residual: usize, vectors: usize, workspace: usize,
): void {
  const r = <i32>at(whereOf, lane);
  meet(chain, fold, r, lane, x, workspace);
  const gamma = mode == PAIR_SECOND ? large : small;
  // (P − γ) u + (re + i·im) w = 0 or (re − i·im) u + (S − γ) w = 0: the row with the larger entries decides
  let ur: f64, ui: f64, wr: f64, wi: f64;
  if (Math.abs(gammaP - gamma) > Math.abs(gammaS - gamma)) {
    ur = -gammaRe; ui = -gammaIm; wr = gammaP - gamma; wi = 0;
  } else {
    ur = gammaS - gamma; ui = 0; wr = -gammaRe; wi = gammaIm;
  }
  let sum = ur * ur + ui * ui + wr * wr + wi * wi;
  if (!(sum > 0)) {
    // Γ = γ·1: any vector, and the other one of a pair is the other axis
    ur = mode == PAIR_SECOND ? 0 : 1; wr = 1 - ur; ui = 0; wi = 0; sum = 1;
  }
  const unit = 1 / Math.sqrt(sum);
  ur *= unit; ui *= unit; wr *= unit; wi *= unit;
  const vector = vectors != 0 ? <usize>load<u32>(vectors + (<usize>lane << 2)) : 0;
  if (vector != 0) putBlock(chain, start, vector, r, ur, ui, wr, wi);
  sum = 1;
  // towards the corner: real in (u, e^{iθ} w)
  let yr = ur, yi = ui;
  let vr = chain.cosine * wr - chain.sine * wi;
  let vi = chain.cosine * wi + chain.sine * wr;
  for (let i = r - 1; i >= 0; i--) {
    const e = load<f64>(fold + <usize>(i + 1) * FOLD_BYTES, 40);
    const f = load<f64>(fold + <usize>(i + 1) * FOLD_BYTES, 48);
    const q = workspace + <usize>i * BLOCK_BYTES + (<usize>lane << 3);
    const p = load<f64>(q), s = load<f64>(q, 64), c = load<f64>(q, 128);
    let det = p * s - c * c;
    if (Math.abs(det) < DETERMINANT_FLOOR) det = DETERMINANT_FLOOR;
    const inverse = -1 / det;
    const a = e * s * inverse, b = f * c * inverse, g = e * c * inverse, h = f * p * inverse;
    const nr = flushed(a * yr - b * vr), ni = flushed(a * yi - b * vi);
    vr = flushed(h * vr - g * yr);
    vi = flushed(h * vi - g * yi);
    yr = nr; yi = ni;
    sum += yr * yr + yi * yi + vr * vr + vi * vi;
    if (vector != 0) putBlock(chain, start, vector, i, yr, yi, chain.cosine * vr + chain.sine * vi, chain.cosine * vi - chain.sine * vr);
  }
  // towards the middle: real in (u, w)
  yr = ur; yi = ui; vr = wr; vi = wi;
  for (let i = r + 1; i < blocks; i++) {
    const e = load<f64>(fold + <usize>i * FOLD_BYTES, 40);
    const f = load<f64>(fold + <usize>i * FOLD_BYTES, 48);
    const q = workspace + <usize>i * BLOCK_BYTES + (<usize>lane << 3);
    const p = load<f64>(q, 192), s = load<f64>(q, 256), c = load<f64>(q, 320);
    let det = p * s - c * c;
    if (Math.abs(det) < DETERMINANT_FLOOR) det = DETERMINANT_FLOOR;
    const inverse = -1 / det;
    const a = e * s * inverse, b = f * c * inverse, g = e * c * inverse, h = f * p * inverse;
    const nr = flushed(a * yr - b * vr), ni = flushed(a * yi - b * vi);
    vr = flushed(h * vr - g * yr);
    vi = flushed(h * vi - g * yi);
    yr = nr; yi = ni;
    sum += yr * yr + yi * yi + vr * vr + vi * vi;
    if (vector != 0) putBlock(chain, start, vector, i, yr, yi, vr, vi);
  }
  put(next, lane, x + gamma / sum);
  put(residual, lane, Math.abs(gamma) / Math.sqrt(sum));
  if (vector == 0) return;
  const scale = 1 / Math.sqrt(sum);
  for (let i = 0; i < 2 * chain.n; i++) put(vector, i, at(vector, i) * scale);
}

/** Writes block i of a fold. The fold has its phase on the bond before `start`; sites below it take e^{iθ}. */
@inline
function putBlock(chain: Chain, start: i32, vector: usize, i: i32, ur: f64, ui: f64, wr: f64, wi: f64): void {
  putSite(chain, vector, start + i, ur, ui);
  putSite(chain, vector, start + chain.n - 1 - i, wr, wi);
}

@inline
function putSite(chain: Chain, vector: usize, site: i32, re: f64, im: f64): void {
  const beyond = site >= chain.n;
  const to = vector + (<usize>(beyond ? site - chain.n : site) << 4);
  store<f64>(to, beyond ? chain.cosine * re - chain.sine * im : re);
  store<f64>(to, beyond ? chain.cosine * im + chain.sine * re : im, 8);
}
