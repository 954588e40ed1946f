/**
 * LU of T − x with partial pivoting for a real symmetric tridiagonal T, and its solve: the workhorse of inverse
 * iteration where levels are too close for a twisted factorisation.
 *
 * Source    G. H. Golub, C. F. Van Loan, Matrix Computations (Johns Hopkins 2013) §4.3; row interchanges as in banded LU.
 * Input     an open chain; workspace of tridiagonalSolveBytes(n).
 * Output    solveTridiagonal overwrites the right side by (T − x)⁻¹ times it.
 * Accuracy  backward stable.   Cost 5 n and 6 n operations.
 * Fails     never: an exactly zero pivot becomes ε‖T‖, which is what inverse iteration wants.
 */
import { EPSILON } from "../constants";
import { Chain } from "./chain";
import { at, put } from "../doubles";

export function tridiagonalSolveBytes(n: i32): u64 {
  return <u64>n * 40;
}

/** workspace: u0[n], u1[n], u2[n] rows of U; l[n] multipliers; swapped[n] as doubles 0/1. */
export function factorTridiagonal(chain: Chain, x: f64, workspace: usize): void {
  const n = chain.n;
  const size = <usize>n << 3;
  const u0 = workspace, u1 = u0 + size, u2 = u1 + size, l = u2 + size, swapped = l + size;
  const floor = EPSILON * chain.norm;
  let a = at(chain.diagonal, 0) - x;
  let b = n > 1 ? at(chain.bonds, 1) : 0;
  for (let i = 0; i + 1 < n; i++) {
    const e = at(chain.bonds, i + 1);
    const d = at(chain.diagonal, i + 1) - x;
    const f = i + 2 < n ? at(chain.bonds, i + 2) : 0;
    if (Math.abs(a) >= Math.abs(e)) {
      if (Math.abs(a) < floor) a = floor;
      const m = e / a;
      put(u0, i, a); put(u1, i, b); put(u2, i, 0); put(l, i, m); put(swapped, i, 0);
      a = d - m * b;
      b = f;
    } else {
      const m = a / e;
      put(u0, i, e); put(u1, i, d); put(u2, i, f); put(l, i, m); put(swapped, i, 1);
      a = b - m * d;
      b = -m * f;
    }
  }
  put(u0, n - 1, Math.abs(a) < floor ? floor : a);
  put(u1, n - 1, 0);
  put(u2, n - 1, 0);
}

export function solveTridiagonal(n: i32, workspace: usize, y: usize): void {
  const size = <usize>n << 3;
  const u0 = workspace, u1 = u0 + size, u2 = u1 + size, l = u2 + size, swapped = l + size;
  for (let i = 0; i + 1 < n; i++) {
    let here = at(y, i);
    let below = at(y, i + 1);
    if (at(swapped, i) != 0) {
      const t = here;
      here = below;
      below = t;
    }
    put(y, i, here);
    put(y, i + 1, below - at(l, i) * here);
  }
  for (let i = n - 1; i >= 0; i--) {
    let value = at(y, i);
    if (i + 1 < n) value -= at(u1, i) * at(y, i + 1);
    if (i + 2 < n) value -= at(u2, i) * at(y, i + 2);
    put(y, i, value / at(u0, i));
  }
}
