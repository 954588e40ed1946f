/**
 * Monotone piecewise-cubic interpolation.
 *
 *   inner slope  s_i = (w₁ + w₂) / (w₁/δ_{i−1} + w₂/δ_i), w₁ = 2h_i + h_{i−1}, w₂ = h_i + 2h_{i−1}; 0 where δ changes sign
 *   end slope    one-sided three-point parabola, cut so that the end piece stays monotone
 *
 * Source    F. N. Fritsch, J. Butland, SIAM J. Sci. Stat. Comput. 5 (1984) 300–304.
 * Input     x strictly increasing, y, n ≥ 2.
 * Accuracy  Passes through the rows; second order or better in between; never overshoots them.
 * Cost      A few divisions per row.   Fails  never.
 */
import { at, put } from "./doubles";

function endSlope(h0: f64, h1: f64, d0: f64, d1: f64): f64 {
  const slope = ((2 * h0 + h1) * d0 - h0 * d1) / (h0 + h1);
  if (slope * d0 <= 0) return 0;
  if (d0 * d1 <= 0 && Math.abs(slope) > 3 * Math.abs(d0)) return 3 * d0;
  return slope;
}

export function fillMonotoneSlopes(x: usize, y: usize, slope: usize, n: i32): void {
  if (n == 2) {
    const d = (at(y, 1) - at(y, 0)) / (at(x, 1) - at(x, 0));
    put(slope, 0, d);
    put(slope, 1, d);
    return;
  }
  let h0 = at(x, 1) - at(x, 0);
  let d0 = (at(y, 1) - at(y, 0)) / h0;
  for (let i = 1; i < n - 1; i++) {
    const h1 = at(x, i + 1) - at(x, i);
    const d1 = (at(y, i + 1) - at(y, i)) / h1;
    if (i == 1) put(slope, 0, endSlope(h0, h1, d0, d1));
    if (i == n - 2) put(slope, n - 1, endSlope(h1, h0, d1, d0));
    const w1 = 2 * h1 + h0;
    const w2 = h1 + 2 * h0;
    put(slope, i, d0 * d1 > 0 ? (w1 + w2) / (w1 / d0 + w2 / d1) : 0);
    h0 = h1;
    d0 = d1;
  }
}

/** Cubic of the piece between rows i and i + 1, by Horner in u − x_i. */
export function hermiteValue(x: usize, y: usize, slope: usize, i: i32, u: f64): f64 {
  const h = at(x, i + 1) - at(x, i);
  const d = (at(y, i + 1) - at(y, i)) / h;
  const s0 = at(slope, i);
  const s1 = at(slope, i + 1);
  const t = u - at(x, i);
  const c2 = (3 * d - 2 * s0 - s1) / h;
  const c3 = (s0 + s1 - 2 * d) / (h * h);
  return at(y, i) + t * (s0 + t * (c2 + t * c3));
}
