/**
 * The sweeps of ring-step.ts over a folded ring for eight shifts: forward blocks D⁺ from the corner, backward blocks D⁻
 * from the middle bond, and Γ with the block where its wanted eigenvalue is smallest.
 *
 * Source    ring-step.ts.   Input  the blocks of a fold (chain.ts), shifts[8], `pairs`.
 * Output    the workspace of RING_BLOCK_BYTES per block; rows, meetP … meetIm per lane.
 * Cost      one division per block, sweep and two shifts, four f64x2 chains.   Fails  never.
 */
import { DETERMINANT_FLOOR, FLUSH, FOLD_BYTES } from "./ring-count";

/** Per block and eight lanes: p, s, c of D⁺; s/det, p/det, c/det of D⁺; the same three of D⁻. */
export const RING_BLOCK_BYTES: usize = 9 * 64;

@inline
function guard(det: v128): v128 {
  const floor = f64x2.splat(DETERMINANT_FLOOR);
  return v128.bitselect(floor, det, f64x2.lt(f64x2.abs(det), floor));
}

@inline
export function flush(c: v128): v128 {
  const tiny = f64x2.splat(FLUSH);
  return f64x2.sub(f64x2.add(c, tiny), tiny);
}

// per lane: the block of the twist and Γ there
export const rows: usize = memory.data(64, 16);
export const meetP: usize = memory.data(64, 16);
export const meetS: usize = memory.data(64, 16);
export const meetRe: usize = memory.data(64, 16);
export const meetIm: usize = memory.data(64, 16);
/** All bits set for lanes of a pair. */
export const pairs: usize = memory.data(64, 16);

export function forward(fold: usize, corner: f64, blocks: i32, shifts: usize, workspace: usize): void {
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
  for (let i = 0; i < blocks; i++) {
    const r0 = f64x2.div(one, guard(f64x2.sub(f64x2.mul(p0, s0), f64x2.mul(c0, c0))));
    const r1 = f64x2.div(one, guard(f64x2.sub(f64x2.mul(p1, s1), f64x2.mul(c1, c1))));
    const r2 = f64x2.div(one, guard(f64x2.sub(f64x2.mul(p2, s2), f64x2.mul(c2, c2))));
    const r3 = f64x2.div(one, guard(f64x2.sub(f64x2.mul(p3, s3), f64x2.mul(c3, c3))));
    from += FOLD_BYTES; // one past the last block is read and not used: chain.ts leaves room
    const a = v128.load64_splat(from, 0);
    const b = v128.load64_splat(from, 8);
    const e2 = v128.load64_splat(from, 16);
    const f2 = v128.load64_splat(from, 24);
    const ef = v128.load64_splat(from, 32);
    v128.store(to, p0, 0);
    v128.store(to, s0, 64);
    v128.store(to, c0, 128);
    const u0 = f64x2.mul(s0, r0);
    const t0 = f64x2.mul(p0, r0);
    const w0 = f64x2.mul(c0, r0);
    v128.store(to, u0, 192);
    v128.store(to, t0, 256);
    v128.store(to, w0, 320);
    p0 = f64x2.sub(f64x2.sub(a, x0), f64x2.mul(e2, u0));
    s0 = f64x2.sub(f64x2.sub(b, x0), f64x2.mul(f2, t0));
    c0 = flush(f64x2.mul(ef, w0));
    v128.store(to, p1, 16);
    v128.store(to, s1, 80);
    v128.store(to, c1, 144);
    const u1 = f64x2.mul(s1, r1);
    const t1 = f64x2.mul(p1, r1);
    const w1 = f64x2.mul(c1, r1);
    v128.store(to, u1, 208);
    v128.store(to, t1, 272);
    v128.store(to, w1, 336);
    p1 = f64x2.sub(f64x2.sub(a, x1), f64x2.mul(e2, u1));
    s1 = f64x2.sub(f64x2.sub(b, x1), f64x2.mul(f2, t1));
    c1 = flush(f64x2.mul(ef, w1));
    v128.store(to, p2, 32);
    v128.store(to, s2, 96);
    v128.store(to, c2, 160);
    const u2 = f64x2.mul(s2, r2);
    const t2 = f64x2.mul(p2, r2);
    const w2 = f64x2.mul(c2, r2);
    v128.store(to, u2, 224);
    v128.store(to, t2, 288);
    v128.store(to, w2, 352);
    p2 = f64x2.sub(f64x2.sub(a, x2), f64x2.mul(e2, u2));
    s2 = f64x2.sub(f64x2.sub(b, x2), f64x2.mul(f2, t2));
    c2 = flush(f64x2.mul(ef, w2));
    v128.store(to, p3, 48);
    v128.store(to, s3, 112);
    v128.store(to, c3, 176);
    const u3 = f64x2.mul(s3, r3);
    const t3 = f64x2.mul(p3, r3);
    const w3 = f64x2.mul(c3, r3);
    v128.store(to, u3, 240);
    v128.store(to, t3, 304);
    v128.store(to, w3, 368);
    p3 = f64x2.sub(f64x2.sub(a, x3), f64x2.mul(e2, u3));
    s3 = f64x2.sub(f64x2.sub(b, x3), f64x2.mul(f2, t3));
    c3 = flush(f64x2.mul(ef, w3));
    to += RING_BLOCK_BYTES;
  }
}

/** Backward blocks; on the way Γ and the block where its wanted eigenvalue is smallest (to a factor of two). */
export function backward(fold: usize, middle: f64, cosine: f64, sine: f64, blocks: i32, shifts: usize, workspace: usize): void {
  const one = f64x2.splat(1);
  const zero = f64x2.splat(0);
  const cos = f64x2.splat(cosine);
  const sin = f64x2.splat(sine);
  let from = fold + <usize>(blocks - 1) * FOLD_BYTES;
  let to = workspace + <usize>(blocks - 1) * RING_BLOCK_BYTES;
  const x0 = v128.load(shifts, 0);
  const pair0 = v128.load(pairs, 0);
  let tp0 = zero;
  let ts0 = zero;
  let c0 = f64x2.splat(middle);
  let best0 = f64x2.splat(Infinity);
  const x1 = v128.load(shifts, 16);
  const pair1 = v128.load(pairs, 16);
  let tp1 = zero;
  let ts1 = zero;
  let c1 = f64x2.splat(middle);
  let best1 = f64x2.splat(Infinity);
  const x2 = v128.load(shifts, 32);
  const pair2 = v128.load(pairs, 32);
  let tp2 = zero;
  let ts2 = zero;
  let c2 = f64x2.splat(middle);
  let best2 = f64x2.splat(Infinity);
  const x3 = v128.load(shifts, 48);
  const pair3 = v128.load(pairs, 48);
  let tp3 = zero;
  let ts3 = zero;
  let c3 = f64x2.splat(middle);
  let best3 = f64x2.splat(Infinity);
  for (let i = blocks - 1; i >= 0; i--) {
    const a = v128.load64_splat(from, 0);
    const b = v128.load64_splat(from, 8);
    const e2 = v128.load64_splat(from, 16);
    const f2 = v128.load64_splat(from, 24);
    const ef = v128.load64_splat(from, 32);
    const index = f64x2.splat(<f64>i);
    // Γ = D⁺ minus what the blocks behind took away
    const gp0 = f64x2.sub(v128.load(to, 0), tp0);
    const gs0 = f64x2.sub(v128.load(to, 64), ts0);
    const gc0 = v128.load(to, 128);
    const gr0 = f64x2.add(f64x2.mul(gc0, cos), c0);
    const gi0 = f64x2.mul(gc0, sin);
    const o0 = f64x2.add(f64x2.mul(gr0, gr0), f64x2.mul(gi0, gi0));
    // |small| ≈ |det|/(|P| + |S| + |o|), |large| ≈ |P| + |S| + |o|, both to a factor of two
    const large0 = f64x2.add(f64x2.add(f64x2.abs(gp0), f64x2.abs(gs0)), f64x2.sqrt(o0));
    const small0 = f64x2.div(f64x2.abs(f64x2.sub(f64x2.mul(gp0, gs0), o0)), large0);
    const size0 = v128.bitselect(large0, small0, pair0);
    const less0 = f64x2.lt(size0, best0);
    if (v128.any_true(less0)) {
      best0 = v128.bitselect(size0, best0, less0);
      v128.store(rows, v128.bitselect(index, v128.load(rows, 0), less0), 0);
      v128.store(meetP, v128.bitselect(gp0, v128.load(meetP, 0), less0), 0);
      v128.store(meetS, v128.bitselect(gs0, v128.load(meetS, 0), less0), 0);
      v128.store(meetRe, v128.bitselect(gr0, v128.load(meetRe, 0), less0), 0);
      v128.store(meetIm, v128.bitselect(gi0, v128.load(meetIm, 0), less0), 0);
    }
    const p0 = f64x2.sub(f64x2.sub(a, x0), tp0);
    const s0 = f64x2.sub(f64x2.sub(b, x0), ts0);
    const r0 = f64x2.div(one, guard(f64x2.sub(f64x2.mul(p0, s0), f64x2.mul(c0, c0))));
    const u0 = f64x2.mul(s0, r0);
    const t0 = f64x2.mul(p0, r0);
    const w0 = f64x2.mul(c0, r0);
    v128.store(to, u0, 384);
    v128.store(to, t0, 448);
    v128.store(to, w0, 512);
    tp0 = f64x2.mul(e2, u0);
    ts0 = f64x2.mul(f2, t0);
    c0 = flush(f64x2.mul(ef, w0));
    // Γ = D⁺ minus what the blocks behind took away
    const gp1 = f64x2.sub(v128.load(to, 16), tp1);
    const gs1 = f64x2.sub(v128.load(to, 80), ts1);
    const gc1 = v128.load(to, 144);
    const gr1 = f64x2.add(f64x2.mul(gc1, cos), c1);
    const gi1 = f64x2.mul(gc1, sin);
    const o1 = f64x2.add(f64x2.mul(gr1, gr1), f64x2.mul(gi1, gi1));
    // |small| ≈ |det|/(|P| + |S| + |o|), |large| ≈ |P| + |S| + |o|, both to a factor of two
    const large1 = f64x2.add(f64x2.add(f64x2.abs(gp1), f64x2.abs(gs1)), f64x2.sqrt(o1));
    const small1 = f64x2.div(f64x2.abs(f64x2.sub(f64x2.mul(gp1, gs1), o1)), large1);
    const size1 = v128.bitselect(large1, small1, pair1);
    const less1 = f64x2.lt(size1, best1);
    if (v128.any_true(less1)) {
      best1 = v128.bitselect(size1, best1, less1);
      v128.store(rows, v128.bitselect(index, v128.load(rows, 16), less1), 16);
      v128.store(meetP, v128.bitselect(gp1, v128.load(meetP, 16), less1), 16);
      v128.store(meetS, v128.bitselect(gs1, v128.load(meetS, 16), less1), 16);
      v128.store(meetRe, v128.bitselect(gr1, v128.load(meetRe, 16), less1), 16);
      v128.store(meetIm, v128.bitselect(gi1, v128.load(meetIm, 16), less1), 16);
    }
    const p1 = f64x2.sub(f64x2.sub(a, x1), tp1);
    const s1 = f64x2.sub(f64x2.sub(b, x1), ts1);
    const r1 = f64x2.div(one, guard(f64x2.sub(f64x2.mul(p1, s1), f64x2.mul(c1, c1))));
    const u1 = f64x2.mul(s1, r1);
    const t1 = f64x2.mul(p1, r1);
    const w1 = f64x2.mul(c1, r1);
    v128.store(to, u1, 400);
    v128.store(to, t1, 464);
    v128.store(to, w1, 528);
    tp1 = f64x2.mul(e2, u1);
    ts1 = f64x2.mul(f2, t1);
    c1 = flush(f64x2.mul(ef, w1));
    // Γ = D⁺ minus what the blocks behind took away
    const gp2 = f64x2.sub(v128.load(to, 32), tp2);
    const gs2 = f64x2.sub(v128.load(to, 96), ts2);
    const gc2 = v128.load(to, 160);
    const gr2 = f64x2.add(f64x2.mul(gc2, cos), c2);
    const gi2 = f64x2.mul(gc2, sin);
    const o2 = f64x2.add(f64x2.mul(gr2, gr2), f64x2.mul(gi2, gi2));
    // |small| ≈ |det|/(|P| + |S| + |o|), |large| ≈ |P| + |S| + |o|, both to a factor of two
    const large2 = f64x2.add(f64x2.add(f64x2.abs(gp2), f64x2.abs(gs2)), f64x2.sqrt(o2));
    const small2 = f64x2.div(f64x2.abs(f64x2.sub(f64x2.mul(gp2, gs2), o2)), large2);
    const size2 = v128.bitselect(large2, small2, pair2);
    const less2 = f64x2.lt(size2, best2);
    if (v128.any_true(less2)) {
      best2 = v128.bitselect(size2, best2, less2);
      v128.store(rows, v128.bitselect(index, v128.load(rows, 32), less2), 32);
      v128.store(meetP, v128.bitselect(gp2, v128.load(meetP, 32), less2), 32);
      v128.store(meetS, v128.bitselect(gs2, v128.load(meetS, 32), less2), 32);
      v128.store(meetRe, v128.bitselect(gr2, v128.load(meetRe, 32), less2), 32);
      v128.store(meetIm, v128.bitselect(gi2, v128.load(meetIm, 32), less2), 32);
    }
    const p2 = f64x2.sub(f64x2.sub(a, x2), tp2);
    const s2 = f64x2.sub(f64x2.sub(b, x2), ts2);
    const r2 = f64x2.div(one, guard(f64x2.sub(f64x2.mul(p2, s2), f64x2.mul(c2, c2))));
    const u2 = f64x2.mul(s2, r2);
    const t2 = f64x2.mul(p2, r2);
    const w2 = f64x2.mul(c2, r2);
    v128.store(to, u2, 416);
    v128.store(to, t2, 480);
    v128.store(to, w2, 544);
    tp2 = f64x2.mul(e2, u2);
    ts2 = f64x2.mul(f2, t2);
    c2 = flush(f64x2.mul(ef, w2));
    // Γ = D⁺ minus what the blocks behind took away
    const gp3 = f64x2.sub(v128.load(to, 48), tp3);
    const gs3 = f64x2.sub(v128.load(to, 112), ts3);
    const gc3 = v128.load(to, 176);
    const gr3 = f64x2.add(f64x2.mul(gc3, cos), c3);
    const gi3 = f64x2.mul(gc3, sin);
    const o3 = f64x2.add(f64x2.mul(gr3, gr3), f64x2.mul(gi3, gi3));
    // |small| ≈ |det|/(|P| + |S| + |o|), |large| ≈ |P| + |S| + |o|, both to a factor of two
    const large3 = f64x2.add(f64x2.add(f64x2.abs(gp3), f64x2.abs(gs3)), f64x2.sqrt(o3));
    const small3 = f64x2.div(f64x2.abs(f64x2.sub(f64x2.mul(gp3, gs3), o3)), large3);
    const size3 = v128.bitselect(large3, small3, pair3);
    const less3 = f64x2.lt(size3, best3);
    if (v128.any_true(less3)) {
      best3 = v128.bitselect(size3, best3, less3);
      v128.store(rows, v128.bitselect(index, v128.load(rows, 48), less3), 48);
      v128.store(meetP, v128.bitselect(gp3, v128.load(meetP, 48), less3), 48);
      v128.store(meetS, v128.bitselect(gs3, v128.load(meetS, 48), less3), 48);
      v128.store(meetRe, v128.bitselect(gr3, v128.load(meetRe, 48), less3), 48);
      v128.store(meetIm, v128.bitselect(gi3, v128.load(meetIm, 48), less3), 48);
    }
    const p3 = f64x2.sub(f64x2.sub(a, x3), tp3);
    const s3 = f64x2.sub(f64x2.sub(b, x3), ts3);
    const r3 = f64x2.div(one, guard(f64x2.sub(f64x2.mul(p3, s3), f64x2.mul(c3, c3))));
    const u3 = f64x2.mul(s3, r3);
    const t3 = f64x2.mul(p3, r3);
    const w3 = f64x2.mul(c3, r3);
    v128.store(to, u3, 432);
    v128.store(to, t3, 496);
    v128.store(to, w3, 560);
    tp3 = f64x2.mul(e2, u3);
    ts3 = f64x2.mul(f2, t3);
    c3 = flush(f64x2.mul(ef, w3));
    to -= RING_BLOCK_BYTES;
    from -= FOLD_BYTES;
  }
}
