/**
 * Eigenvalues of a small dense complex Hermitian matrix by cyclic Jacobi rotations.
 *
 *   each rotation makes a[p][q] zero: first its phase is taken into column q, then the real rotation of the 2×2 block
 *
 * Source    C. G. J. Jacobi, Crelle 30 (1846) 51–94; complex form: G. H. Golub, C. F. Van Loan, Matrix Computations
 *           (Johns Hopkins 2013) §8.5.
 * Input     n, a: n × n complex, row-major, re and im (destroyed; both triangles given).
 * Output    values[n] ascending.
 * Accuracy  a few n ε‖A‖.   Cost  about 10 n³ per sweep, rarely more than 6 sweeps.
 * Fails     false after 60 sweeps.
 */
import { EPSILON } from "../constants";
import { at, put } from "../doubles";

@inline
function entry(a: usize, n: i32, row: i32, column: i32): usize {
  return a + (<usize>(row * n + column) << 4);
}

export function jacobiEigenvalues(n: i32, a: usize, values: usize): bool {
  let total: f64 = 0;
  for (let i = 0; i < 2 * n * n; i++) total += at(a, i) * at(a, i);
  let done = n == 1;
  for (let sweep = 0; sweep < 60 && !done; sweep++) {
    let off: f64 = 0;
    for (let p = 0; p < n; p++) for (let q = p + 1; q < n; q++) off += rotate(n, a, p, q);
    done = off <= EPSILON * EPSILON * total;
  }
  for (let i = 0; i < n; i++) {
    const value = load<f64>(entry(a, n, i, i));
    let k = i;
    for (; k > 0 && at(values, k - 1) > value; k--) put(values, k, at(values, k - 1));
    put(values, k, value);
  }
  return done;
}

/** One rotation; answers |a[p][q]|² before it. */
function rotate(n: i32, a: usize, p: i32, q: i32): f64 {
  const re = load<f64>(entry(a, n, p, q));
  const im = load<f64>(entry(a, n, p, q), 8);
  const size = Math.sqrt(re * re + im * im);
  if (size == 0) return 0;
  const cr = re / size, ci = im / size; // e^{iφ} of a[p][q]
  const theta = (load<f64>(entry(a, n, q, q)) - load<f64>(entry(a, n, p, p))) / (2 * size);
  const t = (theta < 0 ? -1.0 : 1.0) / (Math.abs(theta) + Math.sqrt(theta * theta + 1));
  const c = 1 / Math.sqrt(t * t + 1);
  const s = t * c;
  // columns: p' = c·p − s·e^{−iφ}·q,  q' = s·e^{iφ}·p + c·q
  for (let i = 0; i < n; i++) {
    const x = entry(a, n, i, p), y = entry(a, n, i, q);
    const xr = load<f64>(x), xi = load<f64>(x, 8), yr = load<f64>(y), yi = load<f64>(y, 8);
    store<f64>(x, c * xr - s * (cr * yr + ci * yi));
    store<f64>(x, c * xi - s * (cr * yi - ci * yr), 8);
    store<f64>(y, s * (cr * xr - ci * xi) + c * yr);
    store<f64>(y, s * (cr * xi + ci * xr) + c * yi, 8);
  }
  // rows: the adjoint
  for (let i = 0; i < n; i++) {
    const x = entry(a, n, p, i), y = entry(a, n, q, i);
    const xr = load<f64>(x), xi = load<f64>(x, 8), yr = load<f64>(y), yi = load<f64>(y, 8);
    store<f64>(x, c * xr - s * (cr * yr - ci * yi));
    store<f64>(x, c * xi - s * (cr * yi + ci * yr), 8);
    store<f64>(y, s * (cr * xr + ci * xi) + c * yr);
    store<f64>(y, s * (cr * xi - ci * xr) + c * yi, 8);
  }
  return size * size;
}
