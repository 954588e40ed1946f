/**
 * Inertia count of a twisted ring at one shift with pivots chosen as they come: what counts where the folded count of
 * ring-count.ts grows.
 *
 * Sites l … r remain; the eliminated ones left p on site l, s on site r and c·e^{iθ} between them. One step eliminates
 *   l         if |p| ≥ |s| and |p| ≥ α|c|:  p' = a − x − e²/p,  s' = s − c²/p,  c' = −e c/p;  likewise r by s;
 *   l and r   else, if |e f| ≤ 10 ‖H‖ |c|, as in ring-count.ts: |c'| = |e f c/det| ≤ |e f|/((1 − α²)|c|);
 *   l, l+1    else, if |e| ≥ |f|, by M = [p, e; e, a − x] with det M ≈ −e²:  p' = a₂ − x − e₂² p/det,
 *             s' = s − c²(a − x)/det,  c' = e e₂ c/det;  likewise r, r−1.
 * So c stays of the order of ‖H‖. The last three or two sites meet the phase.
 *
 * Source    J. R. Bunch, L. Kaufman, Math. Comp. 31 (1977) 163–179 (1×1 or 2×2 pivots, α = (1 + √17)/8); for a ring,
 *           own derivation (above).
 * Input     a sealed ring; x; start, the site after the bond where elimination begins.
 * Output    the count; `pivotedGrowth` = largest |c|.
 * Accuracy  the exact count of a matrix within a few ε·max(‖H‖, growth).   Cost  about one division per site.
 * Fails     never; the caller judges the growth.
 */
import { Chain, wrap } from "./chain";
import { at } from "../doubles";
import { DETERMINANT_FLOOR } from "./ring-count";

const ALPHA: f64 = 0.6403882032022076; // (1 + √17)/8
const PIVOT_FLOOR: f64 = 1e-150;

export let pivotedGrowth: f64 = 0;

/** Negative eigenvalues of a real symmetric or Hermitian 2×2 block with diagonal p, q and this determinant. */
@inline
function negativesOf(p: f64, determinant: f64): i32 {
  return determinant < 0 ? 1 : p < 0 ? 2 : 0;
}

@inline
function away(x: f64, floor: f64): f64 {
  return Math.abs(x) < floor ? -floor : x;
}

export function ringCountPivoted(chain: Chain, x: f64, start: i32): i32 {
  const n = chain.n;
  const d = chain.diagonal;
  const b = chain.bonds;
  let l = 0;
  let r = n - 1;
  let p = at(d, start) - x;
  let s = at(d, wrap(start + n - 1, n)) - x;
  let c = at(b, start);
  let count = 0;
  let growth: f64 = 0;
  while (r - l >= 2) {
    const ap = Math.abs(p), as = Math.abs(s), ac = Math.abs(c);
    if (ac > growth) growth = ac;
    const e = at(b, wrap(start + l + 1, n));
    const f = at(b, wrap(start + r, n));
    const a = at(d, wrap(start + l + 1, n)) - x;
    const z = at(d, wrap(start + r - 1, n)) - x;
    if (ap >= as && ap >= ALPHA * ac) {
      p = away(p, PIVOT_FLOOR);
      if (p < 0) count++;
      const m = 1 / p;
      p = a - e * e * m;
      s -= c * c * m;
      c *= -e * m;
      l++;
    } else if (as >= ALPHA * ac) {
      s = away(s, PIVOT_FLOOR);
      if (s < 0) count++;
      const m = 1 / s;
      s = z - f * f * m;
      p -= c * c * m;
      c *= -f * m;
      r--;
    } else if (Math.abs(e * f) <= 10 * chain.norm * ac) {
      const det = away(p * s - c * c, DETERMINANT_FLOOR);
      const m = 1 / det;
      count += negativesOf(p, det);
      if (r - l == 2) {
        pivotedGrowth = growth;
        return count + (a - m * (e * e * s + f * f * p - 2 * e * f * c * chain.cosine) < 0 ? 1 : 0);
      }
      const t = p;
      p = a - e * e * s * m;
      s = z - f * f * t * m;
      c *= e * f * m;
      l++;
      r--;
    } else if (Math.abs(e) >= Math.abs(f)) {
      const det = away(p * a - e * e, DETERMINANT_FLOOR);
      const m = 1 / det;
      count += negativesOf(p, det);
      if (r - l == 2) {
        pivotedGrowth = growth;
        return count + (s - m * (c * c * a + f * f * p - 2 * c * e * f * chain.cosine) < 0 ? 1 : 0);
      }
      const e2 = at(b, wrap(start + l + 2, n));
      s -= c * c * a * m;
      p = at(d, wrap(start + l + 2, n)) - x - e2 * e2 * p * m;
      c *= e * e2 * m;
      l += 2;
    } else {
      const det = away(s * z - f * f, DETERMINANT_FLOOR);
      const m = 1 / det;
      count += negativesOf(s, det);
      if (r - l == 2) {
        pivotedGrowth = growth;
        return count + (p - m * (c * c * z + e * e * s - 2 * c * e * f * chain.cosine) < 0 ? 1 : 0);
      }
      const f2 = at(b, wrap(start + r - 1, n));
      p -= c * c * z * m;
      s = at(d, wrap(start + r - 2, n)) - x - f2 * f2 * s * m;
      c *= f * f2 * m;
      r -= 2;
    }
    if (Math.abs(c) < 1e-140) c = 0;
  }
  pivotedGrowth = growth;
  const middle = at(b, wrap(start + r, n));
  p = away(p, PIVOT_FLOOR);
  s = away(s, PIVOT_FLOOR);
  const re = c * chain.cosine + middle;
  const im = c * chain.sine;
  const det = p * s - (re * re + im * im);
  return count + negativesOf(p, det);
}
