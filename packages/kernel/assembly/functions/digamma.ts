/**
 * Imaginary part of the digamma function ψ(x + iy), x > 0.
 *
 *   ψ(z) = ψ(z + k) − Σ_{j<k} 1/(z + j),   ψ(z) ~ ln z − 1/(2z) − Σ B_{2n}/(2n z^{2n})   for |z| ≥ 8
 *
 * Source    M. Abramowitz, I. A. Stegun, Handbook of Mathematical Functions, 6.3.5 and 6.3.18.
 * Accuracy  Absolute 1e-15.   Cost  at most 8 divisions, one arctangent, seven complex products.   Fails  never.
 */
export function digammaImaginary(x: f64, y: f64): f64 {
  let sum = 0.0;
  while (x * x + y * y < 64) {
    sum += y / (x * x + y * y); // −Im 1/(x + iy)
    x += 1;
  }
  const size = x * x + y * y;
  const re = x / size; // 1/z
  const im = -y / size;
  const re2 = re * re - im * im; // 1/z²
  const im2 = 2 * re * im;
  // Horner in 1/z² of B₂ₙ/2n = 1/12, −1/120, 1/252, −1/240, 1/132, −691/32760, 1/12, −3617/8160
  let a = -3617.0 / 8160;
  let b = 0.0;
  for (let n = 6; n >= 0; n--) {
    const c = a * re2 - b * im2 + coefficient(n);
    b = a * im2 + b * re2;
    a = c;
  }
  return sum + Math.atan2(y, x) - 0.5 * im - (a * im2 + b * re2);
}

function coefficient(n: i32): f64 {
  switch (n) {
    case 0: return 1.0 / 12;
    case 1: return -1.0 / 120;
    case 2: return 1.0 / 252;
    case 3: return -1.0 / 240;
    case 4: return 1.0 / 132;
    case 5: return -691.0 / 32760;
    default: return 1.0 / 12;
  }
}
