/**
 * The limit h → 0 of a quantity known on three grids whose errors are powers of h².
 *
 *   R₁₂, R₂₃ linear in h² through two grids each, R quadratic through all three; error |R − R₂₃|
 *
 * Source    L. F. Richardson, Phil. Trans. R. Soc. A 210, 307 (1911); E. H. Neville's scheme, W. H. Press et al.,
 *           Numerical Recipes §3.1 (common practice).
 * Accuracy  Where (E₁ − E₂)/(E₂ − E₃) lies outside 3 … 5 the sequence does not behave as h²: nothing is extrapolated,
 *           the value is E₃ and the error |E₃ − E₂|, or |E₂ − E₁|/4 if that is larger. Differences below `noise` are rounding: value E₃, error noise.
 */
export let limitValue: f64 = 0;
export let limitError: f64 = 0;
/** Whether the three-grid scheme (or agreement to rounding) gave the value. */
export let limitHolds: bool = true;

export function extrapolate(e1: f64, e2: f64, e3: f64, h1: f64, h2: f64, h3: f64, noise: f64): void {
  const d12 = e1 - e2;
  const d23 = e2 - e3;
  limitHolds = true;
  if (Math.abs(d23) <= noise && Math.abs(d12) <= 5 * noise) {
    limitValue = e3;
    limitError = noise;
    return;
  }
  // |d23| > 0 here or the ratio is infinite and refused
  const ratio = d12 / d23;
  if (!(ratio >= 3 && ratio <= 5)) {
    limitValue = e3;
    // an uneven sequence may happen to stand still once
    limitError = Math.max(Math.abs(d23), 0.25 * Math.abs(d12)) + noise;
    limitHolds = false;
    return;
  }
  const x1 = h1 * h1, x2 = h2 * h2, x3 = h3 * h3;
  const r12 = e2 - (d12 * x2) / (x1 - x2);
  const r23 = e3 - (d23 * x3) / (x2 - x3);
  const r = r23 + ((r23 - r12) * x3) / (x1 - x3);
  limitValue = r;
  limitError = Math.abs(r - r23) + noise;
}
