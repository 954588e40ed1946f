/**
 * Closed forms of the uniform ribbon (no field, no profiles): level of a signed index at k, without spin.
 *
 *   zigzag         τk sin(qW) + q cos(qW) = 0, E = ħv√(k² + q²); for τkW ≤ −1 the lowest is the edge state
 *                  z coth(zW) = −τk, E = ħv z/sinh(zW) (never √(k² − z²), which cancels)
 *   armchair       q = (2πn + θ)/2W, θ = 2KW;   periodic  q = (2πn + θ)/W
 *   infinite mass  q = (n + ½)π/W; opposite walls: q = nπ/W and the chiral E = ±τħvk
 *
 * Source    L. Brey, H. A. Fertig, PRB 73, 235411 (2006); M. V. Berry, R. J. Mondragon, Proc. R. Soc. A 412, 53 (1987)
 *           (both from memory; re-derived).
 * Accuracy  a few ε relative.   Cost  some 60 evaluations of sin and cos for zigzag, else a square root.
 */
import { ARMCHAIR, edge, INFINITE_MASS, isMassDomain, lowerSign, PERIODIC, ringCosine, ringSine, velocity, widthNm } from "./parameters";

export function uniformLevel(index: i32, k: f64, valley: f64): f64 {
  if (isMassDomain()) {
    if (index == 0) return valley * <f64>lowerSign * velocity * k;
    const q = (Math.abs(<f64>index) * Math.PI) / widthNm;
    return (index < 0 ? -1 : 1) * velocity * Math.sqrt(k * k + q * q);
  }
  const n = index >= 0 ? index : -1 - index;
  const sign: f64 = index >= 0 ? 1 : -1;
  if (edge == INFINITE_MASS) {
    const q = ((<f64>n + 0.5) * Math.PI) / widthNm;
    return sign * velocity * Math.sqrt(k * k + q * q);
  }
  if (edge == ARMCHAIR || edge == PERIODIC) {
    const length = edge == ARMCHAIR ? 2 * widthNm : widthNm;
    const phase = Math.abs(Math.atan2(ringSine, ringCosine));
    const q = (n & 1 ? <f64>(n + 1) * Math.PI - phase : <f64>n * Math.PI + phase) / length;
    return sign * velocity * Math.sqrt(k * k + q * q);
  }
  return sign * zigzagLevel(n, valley * k);
}

function zigzagLevel(n: i32, k: f64): f64 {
  const w = widthNm;
  if (n == 0 && k * w <= -1) return edgeLevel(-k * w) / w;
  // kW sin u + u cos u = 0 with one root u in (nπ, (n+1)π)
  let low = <f64>n * Math.PI;
  let high = low + Math.PI;
  const rising = (n & 1) == 0 ? -1.0 : 1.0; // sign of the function at the upper end
  for (let pass = 0; pass < 60; pass++) {
    const u = 0.5 * (low + high);
    const f = k * w * Math.sin(u) + u * Math.cos(u);
    if (f * rising > 0) high = u;
    else low = u;
  }
  const q = (0.5 * (low + high)) / w;
  return velocity * Math.sqrt(k * k + q * q);
}

/** ħv x/sinh x with x coth x = c ≥ 1. */
function edgeLevel(c: f64): f64 {
  let low: f64 = 0;
  let high = c; // x coth x ≥ x
  for (let pass = 0; pass < 100; pass++) {
    const x = 0.5 * (low + high);
    const e = Math.exp(-2 * x);
    const value = x < 1e-8 ? 1 : (x * (1 + e)) / (1 - e);
    if (value > c) high = x;
    else low = x;
  }
  const x = 0.5 * (low + high);
  if (x < 1e-8) return velocity;
  const e = Math.exp(-x);
  return (velocity * 2 * x * e) / (1 - e * e);
}
