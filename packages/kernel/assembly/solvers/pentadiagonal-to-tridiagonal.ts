/**
 * Orthogonal reduction of a real symmetric pentadiagonal matrix to tridiagonal form by plane rotations.
 *
 * For each column k the element (k+2, k) is rotated away in the plane (k+1, k+2); the bulge this makes three places
 * below the diagonal is chased down the band, two rows at a time, until it leaves the matrix.
 *
 * Source    H. R. Schwarz, Numer. Math. 12 (1968) 231–241 (band reduction without enlarging the band).
 * Input     d[n] diagonal; e[i] element (i, i−1), f[i] element (i, i−2); e[0], f[0], f[1] unused. n ≥ 1.
 * Output    d and e overwritten; f becomes 0.
 * Accuracy  Eigenvalues move by a small multiple of n ε‖A‖ at most, √n ε‖A‖ as a rule.
 * Cost      n²/4 rotations of 20 multiplications.   Fails  never.
 */
import { at, put } from "../doubles";

export function pentadiagonalToTridiagonal(n: i32, d: usize, e: usize, f: usize): void {
  for (let k = 0; k + 2 < n; k++) {
    let x = at(e, k + 1);
    let y = at(f, k + 2);
    if (y == 0) continue;
    let r = Math.sqrt(x * x + y * y);
    put(e, k + 1, r);
    put(f, k + 2, 0);
    let bulge = rotate(n, d, e, f, k + 1, x / r, y / r);
    // the bulge sits at (p + 3, p), p = k + 1, k + 3, …
    for (let p = k + 1; bulge != 0; p += 2) {
      x = at(f, p + 2);
      y = bulge;
      r = Math.sqrt(x * x + y * y);
      const c = x / r;
      const s = y / r;
      put(f, p + 2, r);
      const upper = at(e, p + 2); // (p+2, p+1)
      const lower = at(f, p + 3); // (p+3, p+1)
      put(e, p + 2, c * upper + s * lower);
      put(f, p + 3, c * lower - s * upper);
      bulge = rotate(n, d, e, f, p + 2, c, s);
    }
  }
}

/** Similarity in the plane (p, p+1) on what lies at and below its 2×2 block; answers the bulge at (p+3, p), or 0. */
function rotate(n: i32, d: usize, e: usize, f: usize, p: i32, c: f64, s: f64): f64 {
  const q = p + 1;
  const dp = at(d, p);
  const dq = at(d, q);
  const pq = at(e, q);
  put(d, p, c * c * dp + 2 * c * s * pq + s * s * dq);
  put(d, q, s * s * dp - 2 * c * s * pq + c * c * dq);
  put(e, q, (c * c - s * s) * pq + c * s * (dq - dp));
  if (q + 1 < n) {
    const toP = at(f, q + 1);
    const toQ = at(e, q + 1);
    put(f, q + 1, c * toP + s * toQ);
    put(e, q + 1, c * toQ - s * toP);
  }
  if (q + 2 >= n) return 0;
  const toQ = at(f, q + 2);
  put(f, q + 2, c * toQ);
  return s * toQ;
}
