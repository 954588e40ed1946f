/**
 * Inertia counts of a twisted ring (cyclic Hermitian tridiagonal matrix), for eight shifts at once.
 *
 * The ring is folded: block i holds sites i and n−1−i, so that the matrix is block tridiagonal with 2×2 blocks whose
 * couplings are diagonal. Block elimination without pivoting, D[i] = A[i] − x − B[i] D[i−1]⁻¹ B[i], keeps the form
 *
 *   D = [ p, c·e^{iθ} ; c·e^{−iθ}, s ],  c real:   p' = a − x − e² s/det,  s' = b − x − f² p/det,  c' = e f c/det,
 *   det = p s − c²,
 *
 * and only in the last block meets the phase the middle bond g, |c e^{iθ} + g|² = (c cos θ + g)² + (c sin θ)². A block with
 * det > 0 counts two or none by the sign of p, one with det < 0 counts one. All arithmetic is real.
 *
 * Source    inertia from LDLᴴ: J. J. Sylvester (1852); block Sturm sequences: W. W. Barth et al. as in sturm-count.ts,
 *           B. N. Parlett, The Symmetric Eigenvalue Problem (SIAM 1998) §3.3; the folding is an own derivation (above).
 * Input     blocks = n/2 ≥ 2; folded[8·blocks]: a, b, e², f², e·f, e, f, 0 per block (e, f couple it to the block before; 0
 *           for the first); corner = real size of H[0][n−1] = corner·e^{iθ}; middle bond g; cosine, sine of θ; shifts[8].
 * Output    counts[8] i32; growth[8] f64 = the largest |c| met.
 * Accuracy  The exact count of a matrix that differs in the places (i, n−1−i) by a few ε·growth and elsewhere as in
 *           sturm-count.ts (the errors of p and s are relative errors of e², f² and of a − x, b − x): trust it while
 *           growth ≤ limit, otherwise choose pivots (ring-count-pivoted.ts).
 * Cost      4 n divisions, four f64x2 chains; no memory.   Fails  never.
 */
import { storeCounts } from "./sturm-count";

/** Bytes of one folded block. */
export const FOLD_BYTES: usize = 64;
/** Floor of |det|: far below any meaningful value, and its inverse times any element stays finite when squared. */
export const DETERMINANT_FLOOR: f64 = 1e-60;
/**
 * Added to p and s: an exact zero becomes a positive pivot whose elimination agrees with how it is counted (a matrix
 * 1e-25 away), also where c = 0 leaves the block singular.
 */
const BIAS: f64 = 1e-25;
/** Added and taken away again: clears |c| below 1e-146, so that a decaying c never becomes a slow subnormal number. */
export const FLUSH: f64 = 1e-130;

@inline
function guard(det: v128): v128 {
  const floor = f64x2.splat(DETERMINANT_FLOOR);
  return v128.bitselect(floor, det, f64x2.lt(f64x2.abs(det), floor));
}

/** One negative eigenvalue of the block per negative pivot p, det/p. */
@inline
function addNegatives(count: v128, p: v128, det: v128): v128 {
  return i64x2.add(count, i64x2.add(i64x2.shr_u(p, 63), i64x2.shr_u(v128.xor(p, det), 63)));
}

@inline
function flush(c: v128): v128 {
  const tiny = f64x2.splat(FLUSH);
  return f64x2.sub(f64x2.add(c, tiny), tiny);
}

export function ringCounts(
  blocks: i32, folded: usize, corner: f64, middle: f64, cosine: f64, sine: f64, shifts: usize, counts: usize, growth: usize,
): void {
  const bias = f64x2.splat(BIAS);
  const x0 = v128.load(shifts, 0);
  let p0 = f64x2.add(f64x2.sub(f64x2.splat(load<f64>(folded)), x0), bias);
  let s0 = f64x2.add(f64x2.sub(f64x2.splat(load<f64>(folded, 8)), x0), bias);
  let c0 = f64x2.splat(corner);
  let g0 = f64x2.splat(0);
  let n0 = i64x2.splat(0);
  const x1 = v128.load(shifts, 16);
  let p1 = f64x2.add(f64x2.sub(f64x2.splat(load<f64>(folded)), x1), bias);
  let s1 = f64x2.add(f64x2.sub(f64x2.splat(load<f64>(folded, 8)), x1), bias);
  let c1 = f64x2.splat(corner);
  let g1 = f64x2.splat(0);
  let n1 = i64x2.splat(0);
  const x2 = v128.load(shifts, 32);
  let p2 = f64x2.add(f64x2.sub(f64x2.splat(load<f64>(folded)), x2), bias);
  let s2 = f64x2.add(f64x2.sub(f64x2.splat(load<f64>(folded, 8)), x2), bias);
  let c2 = f64x2.splat(corner);
  let g2 = f64x2.splat(0);
  let n2 = i64x2.splat(0);
  const x3 = v128.load(shifts, 48);
  let p3 = f64x2.add(f64x2.sub(f64x2.splat(load<f64>(folded)), x3), bias);
  let s3 = f64x2.add(f64x2.sub(f64x2.splat(load<f64>(folded, 8)), x3), bias);
  let c3 = f64x2.splat(corner);
  let g3 = f64x2.splat(0);
  let n3 = i64x2.splat(0);
  const one = f64x2.splat(1);
  let at = folded + FOLD_BYTES;
  for (const end = folded + <usize>blocks * FOLD_BYTES; at < end; at += FOLD_BYTES) {
    const a = v128.load64_splat(at, 0);
    const b = v128.load64_splat(at, 8);
    const e2 = v128.load64_splat(at, 16);
    const f2 = v128.load64_splat(at, 24);
    const ef = v128.load64_splat(at, 32);
    const det0 = guard(f64x2.sub(f64x2.mul(p0, s0), f64x2.mul(c0, c0)));
    const det1 = guard(f64x2.sub(f64x2.mul(p1, s1), f64x2.mul(c1, c1)));
    const det2 = guard(f64x2.sub(f64x2.mul(p2, s2), f64x2.mul(c2, c2)));
    const det3 = guard(f64x2.sub(f64x2.mul(p3, s3), f64x2.mul(c3, c3)));
    const r0 = f64x2.div(one, det0);
    const r1 = f64x2.div(one, det1);
    const r2 = f64x2.div(one, det2);
    const r3 = f64x2.div(one, det3);
    n0 = addNegatives(n0, p0, det0);
    const t0 = f64x2.mul(p0, r0);
    p0 = f64x2.add(f64x2.sub(f64x2.sub(a, x0), f64x2.mul(e2, f64x2.mul(s0, r0))), bias);
    s0 = f64x2.add(f64x2.sub(f64x2.sub(b, x0), f64x2.mul(f2, t0)), bias);
    c0 = flush(f64x2.mul(ef, f64x2.mul(c0, r0)));
    g0 = f64x2.pmax(g0, f64x2.abs(c0));
    n1 = addNegatives(n1, p1, det1);
    const t1 = f64x2.mul(p1, r1);
    p1 = f64x2.add(f64x2.sub(f64x2.sub(a, x1), f64x2.mul(e2, f64x2.mul(s1, r1))), bias);
    s1 = f64x2.add(f64x2.sub(f64x2.sub(b, x1), f64x2.mul(f2, t1)), bias);
    c1 = flush(f64x2.mul(ef, f64x2.mul(c1, r1)));
    g1 = f64x2.pmax(g1, f64x2.abs(c1));
    n2 = addNegatives(n2, p2, det2);
    const t2 = f64x2.mul(p2, r2);
    p2 = f64x2.add(f64x2.sub(f64x2.sub(a, x2), f64x2.mul(e2, f64x2.mul(s2, r2))), bias);
    s2 = f64x2.add(f64x2.sub(f64x2.sub(b, x2), f64x2.mul(f2, t2)), bias);
    c2 = flush(f64x2.mul(ef, f64x2.mul(c2, r2)));
    g2 = f64x2.pmax(g2, f64x2.abs(c2));
    n3 = addNegatives(n3, p3, det3);
    const t3 = f64x2.mul(p3, r3);
    p3 = f64x2.add(f64x2.sub(f64x2.sub(a, x3), f64x2.mul(e2, f64x2.mul(s3, r3))), bias);
    s3 = f64x2.add(f64x2.sub(f64x2.sub(b, x3), f64x2.mul(f2, t3)), bias);
    c3 = flush(f64x2.mul(ef, f64x2.mul(c3, r3)));
    g3 = f64x2.pmax(g3, f64x2.abs(c3));
  }
  // |c e^{iθ} + g|² as a sum of squares: c² + 2 c g cos θ + g² would cancel where a level is nearly double
  const cos = f64x2.splat(cosine);
  const sin = f64x2.splat(sine);
  const bond = f64x2.splat(middle);
  const u0 = f64x2.add(f64x2.mul(c0, cos), bond);
  const w0 = f64x2.mul(c0, sin);
  n0 = addNegatives(n0, p0, f64x2.sub(f64x2.mul(p0, s0), f64x2.add(f64x2.mul(u0, u0), f64x2.mul(w0, w0))));
  const u1 = f64x2.add(f64x2.mul(c1, cos), bond);
  const w1 = f64x2.mul(c1, sin);
  n1 = addNegatives(n1, p1, f64x2.sub(f64x2.mul(p1, s1), f64x2.add(f64x2.mul(u1, u1), f64x2.mul(w1, w1))));
  const u2 = f64x2.add(f64x2.mul(c2, cos), bond);
  const w2 = f64x2.mul(c2, sin);
  n2 = addNegatives(n2, p2, f64x2.sub(f64x2.mul(p2, s2), f64x2.add(f64x2.mul(u2, u2), f64x2.mul(w2, w2))));
  const u3 = f64x2.add(f64x2.mul(c3, cos), bond);
  const w3 = f64x2.mul(c3, sin);
  n3 = addNegatives(n3, p3, f64x2.sub(f64x2.mul(p3, s3), f64x2.add(f64x2.mul(u3, u3), f64x2.mul(w3, w3))));
  v128.store(growth, g0, 0);
  v128.store(growth, g1, 16);
  v128.store(growth, g2, 32);
  v128.store(growth, g3, 48);
  storeCounts(counts, n0, n1, n2, n3);
}
