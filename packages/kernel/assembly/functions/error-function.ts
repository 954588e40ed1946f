/**
 * Complementary error function.
 *
 *   |x| < 2   erf x = (2/√π) e^{−x²} Σ 2ⁿ x^{2n+1}/(2n+1)!!       (all terms of one sign: no cancellation)
 *   x ≥ 2     erfc x = e^{−x²}/√π · 1/(x + (1/2)/(x + (2/2)/(x + (3/2)/(x + …)))), evaluated from the tail
 *   x ≤ −2    erfc x = 2 − erfc(−x)
 *
 * Source    M. Abramowitz, I. A. Stegun, Handbook of Mathematical Functions, 7.1.6 and 7.1.14.
 * Accuracy  Relative 1e-14 for erfc up to x = 6, absolute 1e-16 below 2; 0 beyond x = 27.
 * Cost      30 to 60 multiplications or divisions.   Fails  never.
 */
const TWO_OVER_ROOT_PI: f64 = 1.1283791670955126;

export function erfc(x: f64): f64 {
  if (x < 0) return 2 - erfc(-x);
  if (x > 27) return 0;
  const square = x * x;
  if (x < 2) {
    let term = x;
    let sum = x;
    for (let n = 1; n < 60 && term > sum * 1e-17; n++) {
      term *= (2 * square) / <f64>(2 * n + 1);
      sum += term;
    }
    return 1 - TWO_OVER_ROOT_PI * Math.exp(-square) * sum;
  }
  // 60 levels reach the last bit at x = 2; fewer are needed further out
  let tail = x;
  for (let n = x > 4 ? 24 : 60; n > 0; n--) tail = x + (0.5 * <f64>n) / tail;
  return (0.5 * TWO_OVER_ROOT_PI * Math.exp(-square)) / tail;
}
