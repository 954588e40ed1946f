/**
 * All eigenvalues and the eigenvectors of a small real symmetric tridiagonal matrix by the implicit QL algorithm.
 *
 * Source    A. Dubrulle, R. S. Martin, J. H. Wilkinson, Handbook for Automatic Computation II (1971) 241–248; EISPACK.
 * Input     d[n], e[n] (e[i] couples i and i+1, e[n−1] unused), z[n·n] room, row-major.
 * Output    d ascending, column k of z (entries z[i·n + k]) its unit vector; e is destroyed.
 * Accuracy  a few ε‖T‖.   Cost  about 3 n³.   Fails  false when one eigenvalue needs more than 60 sweeps.
 */
import { at, put } from "../doubles";
import { EPSILON } from "../constants";

export function implicitQl(n: i32, d: usize, e: usize, z: usize): bool {
  for (let i = 0; i < n; i++) for (let k = 0; k < n; k++) put(z, i * n + k, i == k ? 1 : 0);
  put(e, n - 1, 0);
  for (let l = 0; l < n; l++) {
    for (let sweep = 0; ; sweep++) {
      let m = l;
      for (; m + 1 < n; m++) {
        const size = Math.abs(at(d, m)) + Math.abs(at(d, m + 1));
        if (Math.abs(at(e, m)) <= EPSILON * size || at(e, m) == 0) break;
      }
      if (m == l) break;
      if (sweep == 60) return false;
      let g = (at(d, l + 1) - at(d, l)) / (2 * at(e, l));
      let r = Math.sqrt(g * g + 1);
      g = at(d, m) - at(d, l) + at(e, l) / (g + (g < 0 ? -r : r));
      let s: f64 = 1;
      let c: f64 = 1;
      let p: f64 = 0;
      let i = m - 1;
      for (; i >= l; i--) {
        let f = s * at(e, i);
        const b = c * at(e, i);
        r = Math.sqrt(f * f + g * g);
        put(e, i + 1, r);
        if (r == 0) {
          put(d, i + 1, at(d, i + 1) - p);
          put(e, m, 0);
          break;
        }
        s = f / r;
        c = g / r;
        g = at(d, i + 1) - p;
        r = (at(d, i) - g) * s + 2 * c * b;
        p = s * r;
        put(d, i + 1, g + p);
        g = c * r - b;
        for (let k = 0; k < n; k++) {
          f = at(z, k * n + i + 1);
          put(z, k * n + i + 1, s * at(z, k * n + i) + c * f);
          put(z, k * n + i, c * at(z, k * n + i) - s * f);
        }
      }
      if (r == 0 && i >= l) continue;
      put(d, l, at(d, l) - p);
      put(e, l, g);
      put(e, m, 0);
    }
  }
  sortPairs(n, d, z);
  return true;
}

function sortPairs(n: i32, d: usize, z: usize): void {
  for (let i = 0; i < n - 1; i++) {
    let least = i;
    for (let k = i + 1; k < n; k++) if (at(d, k) < at(d, least)) least = k;
    if (least == i) continue;
    const value = at(d, i);
    put(d, i, at(d, least));
    put(d, least, value);
    for (let row = 0; row < n; row++) {
      const t = at(z, row * n + i);
      put(z, row * n + i, at(z, row * n + least));
      put(z, row * n + least, t);
    }
  }
}
