/**
 * All eigenvalues of a small dense real symmetric matrix by cyclic Jacobi rotations.
 *
 *   t = sgn(θ)/(|θ| + √(θ² + 1)), θ = (a_qq − a_pp)/(2 a_pq);  a_pp −= t a_pq, a_qq += t a_pq, a_pq = 0
 *
 * Source    H. Rutishauser, Numer. Math. 9 (1966) 1–10.
 * Input     a[n·n] row-major, symmetric, overwritten; n ≤ 16.
 * Output    values[n] ascending.
 * Accuracy  Absolute a few ε‖A‖; small eigenvalues of graded matrices better than that.
 * Cost      About 4 n³ multiplications per sweep, 4 to 6 sweeps.   Fails  never: a sweep always lowers the off-diagonal.
 */
import { heapSort } from "../linalg/heap-sort";

export function realJacobi(a: usize, n: i32, values: usize): void {
  const row = <usize>n << 3;
  for (let sweep = 0; sweep < 40; sweep++) {
    let off = 0.0;
    let size = 0.0;
    for (let p = 0; p < n; p++) {
      size += Math.abs(load<f64>(a + <usize>p * (row + 8)));
      for (let q = p + 1; q < n; q++) off += Math.abs(load<f64>(a + <usize>p * row + (<usize>q << 3)));
    }
    if (off <= 1e-18 * size) break;
    for (let p = 0; p < n - 1; p++) for (let q = p + 1; q < n; q++) rotate(a, n, row, p, q);
  }
  for (let i = 0; i < n; i++) store<f64>(values + (<usize>i << 3), load<f64>(a + <usize>i * (row + 8)));
  heapSort(values, n);
}

function rotate(a: usize, n: i32, row: usize, p: i32, q: i32): void {
  const atPQ = a + <usize>p * row + (<usize>q << 3);
  const apq = load<f64>(atPQ);
  if (apq == 0) return;
  const atPP = a + <usize>p * (row + 8);
  const atQQ = a + <usize>q * (row + 8);
  const theta = (0.5 * (load<f64>(atQQ) - load<f64>(atPP))) / apq;
  const t = (theta < 0 ? -1.0 : 1.0) / (Math.abs(theta) + Math.sqrt(theta * theta + 1));
  const c = 1 / Math.sqrt(t * t + 1);
  const s = t * c;
  store<f64>(atPP, load<f64>(atPP) - t * apq);
  store<f64>(atQQ, load<f64>(atQQ) + t * apq);
  store<f64>(atPQ, 0);
  store<f64>(a + <usize>q * row + (<usize>p << 3), 0);
  for (let r = 0; r < n; r++) {
    if (r == p || r == q) continue;
    const atRP = a + <usize>r * row + (<usize>p << 3);
    const atRQ = a + <usize>r * row + (<usize>q << 3);
    const arp = load<f64>(atRP);
    const arq = load<f64>(atRQ);
    const np = c * arp - s * arq;
    const nq = s * arp + c * arq;
    store<f64>(atRP, np);
    store<f64>(atRQ, nq);
    store<f64>(a + <usize>p * row + (<usize>r << 3), np);
    store<f64>(a + <usize>q * row + (<usize>r << 3), nq);
  }
}
