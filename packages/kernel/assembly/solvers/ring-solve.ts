/**
 * Solves with H − x for a twisted ring: reordered 0, n−1, 1, n−2, … it is a Hermitian band matrix of half-bandwidth 2,
 * factored by band-solve.ts. Used only where levels are too close for ring-step.ts.
 *
 * Source    the reordering of a cyclic band, e.g. G. H. Golub, C. F. Van Loan, Matrix Computations (2013) §4.3.
 */
import { mark, release, reserve } from "../arena";
import { BandMatrix, newBand, sealBand, setEntry } from "./band-matrix";
import { bandSolveBytes, factorBand, solveBand } from "./band-solve";
import { Chain } from "./chain";
import { at } from "../doubles";

export function ringSolveBytes(n: i32): u64 {
  return bandSolveBytes(n, 2) + <u64>n * 16 + <u64>n * 48 + 512;
}

let band: BandMatrix | null = null;

/** Place of site i in the folded order. */
@inline
function place(i: i32, n: i32): i32 {
  return i < n / 2 ? 2 * i : 2 * (n - 1 - i) + 1;
}

export function ringBand(chain: Chain): BandMatrix {
  const n = chain.n;
  const matrix = newBand(n, 2);
  for (let i = 0; i < n; i++) {
    setEntry(matrix, place(i, n), place(i, n), at(chain.diagonal, i), 0);
    if (i + 1 < n) {
      const a = place(i, n), b = place(i + 1, n);
      setEntry(matrix, max(a, b), min(a, b), at(chain.bonds, i + 1), 0);
    }
  }
  // H[n−1][0] = corner·e^{−iθ} at places (1, 0); n = 2 has no other bond there
  setEntry(matrix, 1, 0, at(chain.bonds, 0) * chain.cosine, -at(chain.bonds, 0) * chain.sine);
  sealBand(matrix);
  return matrix;
}

/** Keeps the matrix in the arena above the workspace until the caller releases its mark. */
export function factorRing(chain: Chain, x: f64, workspace: usize): void {
  band = ringBand(chain);
  factorBand(band!, x, workspace);
}

export function solveRing(chain: Chain, workspace: usize, z: usize): void {
  const room = mark();
  const n = chain.n;
  const y = reserve(<u64>n * 16);
  for (let i = 0; i < n; i++) v128.store(y + (<usize>place(i, n) << 4), v128.load(z + (<usize>i << 4)));
  solveBand(band!, workspace, y);
  for (let i = 0; i < n; i++) v128.store(z + (<usize>i << 4), v128.load(y + (<usize>place(i, n) << 4)));
  release(room);
}
