/**
 * Inertia count of a twisted ring at one shift with pivots chosen as they come: what counts where the folded count of
 * ring-count.ts grows.
 *
 * Sites l … r remain; the eliminated ones left p on site l, s on site r and c·e^{iθ} between them. One step eliminates
 *   l    if |p| is the largest and |p| ≥ α|c|:  p' = a − x − e²/p,  s' = s − c²/p,  c' = −e c/p;
 *   r    likewise with s;
 *   both otherwise, as in ring-count.ts (|det| ≥ (1 − α²) c²).
 * So |c| stays below ‖H‖/α unless p, s and c vanish together.
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
    if (ap >= as && ap >= ALPHA * ac) {
      if (ap < PIVOT_FLOOR) p = PIVOT_FLOOR;
      if (p < 0) count++;
      const m = 1 / p;
      p = at(d, wrap(start + l + 1, n)) - x - e * e * m;
      s -= c * c * m;
      c *= -e * m;
      l++;
    } else if (as >= ALPHA * ac) {
      if (as < PIVOT_FLOOR) s = PIVOT_FLOOR;
      if (s < 0) count++;
      const m = 1 / s;
      s = at(d, wrap(start + r - 1, n)) - x - f * f * m;
      p -= c * c * m;
      c *= -f * m;
      r--;
    } else {
      const det = p * s - c * c; // negative: one of each sign
      const m = 1 / (Math.abs(det) < DETERMINANT_FLOOR ? -DETERMINANT_FLOOR : det);
      count++;
      if (r - l == 2) {
        const last = at(d, wrap(start + l + 1, n)) - x - m * (e * e * s + f * f * p - 2 * e * f * c * chain.cosine);
        pivotedGrowth = growth;
        return count + (last < 0 ? 1 : 0);
      }
      const t = p;
      p = at(d, wrap(start + l + 1, n)) - x - e * e * s * m;
      s = at(d, wrap(start + r - 1, n)) - x - f * f * t * m;
      c = e * f * c * m;
      l++;
      r--;
    }
    if (Math.abs(c) < 1e-140) c = 0;
  }
  const middle = at(b, wrap(start + r, n));
  const det = p * s - (c * c + 2 * c * middle * chain.cosine + middle * middle);
  pivotedGrowth = growth;
  return count + (det < 0 ? 1 : p < 0 ? 2 : 0);
}
