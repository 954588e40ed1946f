/**
 * Twisted block factorisations of a ring at eight shifts at once: one step of Rayleigh-quotient iteration each.
 *
 * On the folded ring of ring-count.ts, forward blocks D⁺[i] = [p, c e^{iθ}; ·, s] from the corner and backward blocks
 * D⁻[i] = [P, C; C, S] (C real) from the middle bond meet in Γ[i] = D⁺[i] + D⁻[i] − (A[i] − x). With γ the smaller
 * eigenvalue of Γ[r] and v its unit vector, z[r] = v, z[i−1] = −D⁺[i−1]⁻¹ B z[i], z[i+1] = −D⁻[i+1]⁻¹ B z[i] gives
 * (H − x) z = γ v at block r and 0 elsewhere: the Rayleigh quotient is x + γ/‖z‖², the residual at x |γ|/‖z‖. Towards
 * the corner everything is real in (z, e^{iθ} z'), towards the middle in (z, z').
 *
 * A ring has levels of multiplicity two. For such a pair both eigenvalues of Γ are small; mode PAIR_FIRST / PAIR_SECOND
 * takes r where the larger of the two is smallest and follows its first / second eigenvector: two independent vectors.
 *
 * Source    block form of the method of twisted-step.ts, own derivation (above).
 * Input     a closed chain; k, the fold to use; used, how many of the eight are wanted; shifts[8]; modes[8] i32; vectors: 8 addresses of 2n doubles (re, im per
 *           site) in a u32 list, 0 for none; workspace of ringStepBytes(n).
 * Output    next[used], residual[used]; unit vectors where asked.
 * Accuracy  as twisted-step.ts while the elimination does not grow; the caller measures the true residual.
 * Cost      about 2 n divisions and 60 n multiplications per two shifts.   Fails  never.
 */
import { Chain, foldCorner, foldMiddle, foldOf, foldStart } from "./chain";
import { at, put } from "../doubles";
import { backward, flush, forward, meetIm, meetP, meetRe, meetS, pairs, RING_BLOCK_BYTES, rows } from "./ring-blocks";
import { FOLD_BYTES } from "./ring-count";

export const LONE: i32 = 0;
export const PAIR_FIRST: i32 = 1;
export const PAIR_SECOND: i32 = 2;

export function ringStepBytes(n: i32): u64 {
  return (<u64>n / 2) * RING_BLOCK_BYTES;
}

/** A vector of two doubles. */
@inline
function both(a: f64, b: f64): v128 {
  return f64x2.replace_lane(f64x2.splat(a), 1, b);
}

export function ringStep(
  chain: Chain, k: i32, used: i32, shifts: usize, modes: usize, next: usize, residual: usize, vectors: usize, workspace: usize,
): void {
  const blocks = chain.n / 2;
  const fold = foldOf(chain, k);
  for (let lane = 0; lane < 8; lane++) {
    store<i64>(pairs + (<usize>lane << 3), load<i32>(modes + (<usize>lane << 2)) == LONE ? 0 : -1);
  }
  forward(fold, foldCorner(chain, k), blocks, shifts, workspace);
  backward(fold, foldMiddle(chain, k), chain.cosine, chain.sine, blocks, shifts, workspace);
  for (let lane = 0; lane < used; lane++) {
    finish(chain, fold, foldStart(chain, k), blocks, lane, at(shifts, lane), load<i32>(modes + (<usize>lane << 2)), next, residual, vectors, workspace);
  }
}

function finish(
  chain: Chain, fold: usize, start: i32, blocks: i32, lane: i32, x: f64, mode: i32,
  next: usize, residual: usize, vectors: usize, workspace: usize,
): void {
  const r = <i32>at(rows, lane);
  const p = at(meetP, lane), s = at(meetS, lane), re = at(meetRe, lane), im = at(meetIm, lane);
  const coupling = re * re + im * im;
  const root = Math.sqrt((p - s) * (p - s) + 4 * coupling);
  const large = 0.5 * (p + s + (p + s < 0 ? -root : root));
  const small = large != 0 ? (p * s - coupling) / large : 0;
  const gamma = mode == PAIR_SECOND ? large : small;
  // (P − γ) u + (re + i·im) w = 0 or (re − i·im) u + (S − γ) w = 0: the row with the larger entries decides
  let ur: f64, ui: f64, wr: f64, wi: f64;
  if (Math.abs(p - gamma) > Math.abs(s - gamma)) {
    ur = -re; ui = -im; wr = p - gamma; wi = 0;
  } else {
    ur = s - gamma; ui = 0; wr = -re; wi = im;
  }
  let sum = ur * ur + ui * ui + wr * wr + wi * wi;
  if (!(sum > 0)) {
    // Γ = γ·1: any vector, and the other one of a pair is the other axis
    ur = mode == PAIR_SECOND ? 0 : 1; wr = 1 - ur; ui = 0; wi = 0; sum = 1;
  }
  const unit = 1 / Math.sqrt(sum);
  ur *= unit; ui *= unit; wr *= unit; wi *= unit;
  const vector = vectors != 0 ? <usize>load<u32>(vectors + (<usize>lane << 2)) : 0;
  if (vector != 0) putBlock(chain, start, vector, r, both(ur, ui), both(wr, wi));
  const offset = <usize>lane << 3;
  let total = f64x2.splat(0);
  // towards the corner: real in (u, e^{iθ} w); lanes of the vectors are re and im
  let y = both(ur, ui);
  let v = both(chain.cosine * wr - chain.sine * wi, chain.cosine * wi + chain.sine * wr);
  for (let i = r - 1; i >= 0; i--) {
    const bonds = fold + <usize>(i + 1) * FOLD_BYTES;
    const q = workspace + <usize>i * RING_BLOCK_BYTES + offset;
    const ey = f64x2.mul(v128.load64_splat(bonds, 40), y);
    const fv = f64x2.mul(v128.load64_splat(bonds, 48), v);
    const c = v128.load64_splat(q, 320);
    y = flush(f64x2.sub(f64x2.mul(c, fv), f64x2.mul(v128.load64_splat(q, 192), ey)));
    v = flush(f64x2.sub(f64x2.mul(c, ey), f64x2.mul(v128.load64_splat(q, 256), fv)));
    total = f64x2.add(total, f64x2.add(f64x2.mul(y, y), f64x2.mul(v, v)));
    if (vector != 0) {
      const vr = f64x2.extract_lane(v, 0), vi = f64x2.extract_lane(v, 1);
      putBlock(chain, start, vector, i, y, both(chain.cosine * vr + chain.sine * vi, chain.cosine * vi - chain.sine * vr));
    }
  }
  // towards the middle: real in (u, w)
  y = both(ur, ui);
  v = both(wr, wi);
  for (let i = r + 1; i < blocks; i++) {
    const bonds = fold + <usize>i * FOLD_BYTES;
    const q = workspace + <usize>i * RING_BLOCK_BYTES + offset;
    const ey = f64x2.mul(v128.load64_splat(bonds, 40), y);
    const fv = f64x2.mul(v128.load64_splat(bonds, 48), v);
    const c = v128.load64_splat(q, 512);
    y = flush(f64x2.sub(f64x2.mul(c, fv), f64x2.mul(v128.load64_splat(q, 384), ey)));
    v = flush(f64x2.sub(f64x2.mul(c, ey), f64x2.mul(v128.load64_splat(q, 448), fv)));
    total = f64x2.add(total, f64x2.add(f64x2.mul(y, y), f64x2.mul(v, v)));
    if (vector != 0) putBlock(chain, start, vector, i, y, v);
  }
  sum = 1 + f64x2.extract_lane(total, 0) + f64x2.extract_lane(total, 1);
  put(next, lane, x + gamma / sum);
  put(residual, lane, Math.abs(gamma) / Math.sqrt(sum));
  if (vector == 0) return;
  const scale = f64x2.splat(1 / Math.sqrt(sum));
  for (let p = vector, end = vector + (<usize>chain.n << 4); p < end; p += 16) v128.store(p, f64x2.mul(v128.load(p), scale));
}

/** Writes block i of a fold. The fold has its phase on the bond before `start`; sites below it take e^{iθ}. */
@inline
function putBlock(chain: Chain, start: i32, vector: usize, i: i32, u: v128, w: v128): void {
  putSite(chain, vector, start + i, u);
  putSite(chain, vector, start + chain.n - 1 - i, w);
}

@inline
function putSite(chain: Chain, vector: usize, site: i32, z: v128): void {
  if (site < chain.n) {
    v128.store(vector + (<usize>site << 4), z);
    return;
  }
  const re = f64x2.extract_lane(z, 0), im = f64x2.extract_lane(z, 1);
  v128.store(vector + (<usize>(site - chain.n) << 4), both(chain.cosine * re - chain.sine * im, chain.cosine * im + chain.sine * re));
}
