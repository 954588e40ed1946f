/** The few-line steps that the solvers share: real arrays of doubles; a complex vector of n is a real one of 2n. */

/** Σ x y. */
export function dot(n: i32, x: usize, y: usize): f64 {
  let sum0 = f64x2.splat(0);
  let sum1 = sum0;
  let i: usize = 0;
  const size = <usize>n << 3;
  for (; i + 32 <= size; i += 32) {
    sum0 = f64x2.add(sum0, f64x2.mul(v128.load(x + i), v128.load(y + i)));
    sum1 = f64x2.add(sum1, f64x2.mul(v128.load(x + i, 16), v128.load(y + i, 16)));
  }
  sum0 = f64x2.add(sum0, sum1);
  let sum = f64x2.extract_lane(sum0, 0) + f64x2.extract_lane(sum0, 1);
  for (; i < size; i += 8) sum += load<f64>(x + i) * load<f64>(y + i);
  return sum;
}

/** y += a x. */
export function addScaled(n: i32, a: f64, x: usize, y: usize): void {
  const factor = f64x2.splat(a);
  let i: usize = 0;
  const size = <usize>n << 3;
  for (; i + 16 <= size; i += 16) {
    v128.store(y + i, f64x2.add(v128.load(y + i), f64x2.mul(factor, v128.load(x + i))));
  }
  for (; i < size; i += 8) store<f64>(y + i, load<f64>(y + i) + a * load<f64>(x + i));
}

export function scale(n: i32, a: f64, x: usize): void {
  for (let p = x, end = x + (<usize>n << 3); p < end; p += 8) store<f64>(p, load<f64>(p) * a);
}

/** Divides by the norm and answers it; a zero vector stays. */
export function normalise(n: i32, x: usize): f64 {
  const norm = Math.sqrt(dot(n, x, x));
  if (norm > 0) scale(n, 1 / norm, x);
  return norm;
}

/** Complex y −= ⟨x|y⟩ x for a unit x; n complex entries, re and im side by side. */
export function projectOut(n: i32, x: usize, y: usize): void {
  let re: f64 = 0;
  let im: f64 = 0;
  const end = <usize>n << 4;
  for (let i: usize = 0; i < end; i += 16) {
    const a = load<f64>(x + i), b = load<f64>(x + i, 8), c = load<f64>(y + i), d = load<f64>(y + i, 8);
    re += a * c + b * d;
    im += a * d - b * c;
  }
  for (let i: usize = 0; i < end; i += 16) {
    const a = load<f64>(x + i), b = load<f64>(x + i, 8);
    store<f64>(y + i, load<f64>(y + i) - (re * a - im * b));
    store<f64>(y + i, load<f64>(y + i, 8) - (re * b + im * a), 8);
  }
}

/**
 * Entries in [−1, 1) from a fixed linear congruence modulo 2⁶⁴ (multiplier of D. E. Knuth's MMIX): start vectors that
 * are the same in every execution.
 */
export function fillFixed(n: i32, seed: u64, x: usize): void {
  let state = seed * 0x9e3779b97f4a7c15 + 1;
  for (let p = x, end = x + (<usize>n << 3); p < end; p += 8) {
    state = state * 6364136223846793005 + 1442695040888963407;
    store<f64>(p, <f64>(<i64>state >> 11) * 2.220446049250313e-16);
  }
}
