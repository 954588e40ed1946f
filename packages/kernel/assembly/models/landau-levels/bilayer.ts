/**
 * Landau levels of the Bernal bilayer without v₃: every block of bilayer-block.ts is closed.
 *
 *   U = v₄ = Δ = 0:  E² = ½ (b ∓ √(b² − 4c)), b = γ₁² + (2N+1) w², c = w⁴ N(N+1), as E_hi² = (b + √…)/2, E_lo² = c/E_hi²;
 *   two zero modes; ±√(γ₁² + w²).   Otherwise the 4×4 block (a quartic) is diagonalised by Jacobi rotations.
 *
 * The list is the middle of all levels, counted from half filling: the blocks up to n hold two levels per block below
 * and two above it, and one of each from blocks 0 and −1.
 *
 * Source    J. M. Pereira, F. M. Peeters, P. Vasilopoulos, PRB 76, 115419 (2007).
 * Accuracy  A few ε relative for the formula, ε‖block‖ absolute for the quartic.
 * Fails     false where blocks past the 5000th would be needed (fields so low that U²/w² exceeds it).
 */
import { at, put } from "../../doubles";
import { reserveF64 } from "../../arena";
import { heapSort } from "../../linalg/heap-sort";
import { realJacobi } from "../../solvers/real-jacobi";
import { fillBlock } from "./bilayer-block";
import { ladderSquare } from "./monolayer";
import { bias, dimerOffset, gamma1, maxIndex, v4Ratio } from "./parameters";

const MAX_BLOCKS: i32 = 5000;

/** Highest block that can hold a listed level; beyond it every band moves away from half filling. */
export function blocksNeeded(b: f64): i32 {
  // past (v p)² = U² the sombrero's rim lies behind (its minimum is below U²/2), and Δ and v₄ only tilt the bands
  const rim = (bias * bias + 4 * dimerOffset * dimerOffset) / ladderSquare(b);
  return rim > <f64>MAX_BLOCKS ? MAX_BLOCKS + 1 : maxIndex + 2 + <i32>rim;
}

/** Whether the energy of every block follows from square roots alone. */
function isPlain(): bool {
  return bias == 0 && v4Ratio == 0 && dimerOffset == 0;
}

/** Levels of one block, ascending; answers their number. */
function blockLevels(n: i32, sign: f64, square: f64, workspace: usize, values: usize): i32 {
  if (!isPlain()) {
    const size = fillBlock(n, sign, square, workspace);
    realJacobi(workspace, size, values);
    return size;
  }
  if (n < 0) {
    put(values, 0, 0);
    return 1;
  }
  if (n == 0) {
    const outer = Math.sqrt(gamma1 * gamma1 + square);
    put(values, 0, -outer);
    put(values, 1, 0);
    put(values, 2, outer);
    return 3;
  }
  const sum = gamma1 * gamma1 + <f64>(2 * n + 1) * square;
  const product = square * square * <f64>n * <f64>(n + 1);
  const high2 = 0.5 * (sum + Math.sqrt(sum * sum - 4 * product));
  const high = Math.sqrt(high2);
  const low = Math.sqrt(product / high2);
  put(values, 0, -high);
  put(values, 1, -low);
  put(values, 2, low);
  put(values, 3, high);
  return 4;
}

/** The 2(maxIndex + 1) levels around half filling in valley tau, ascending. */
export function bilayerLevels(b: f64, tau: f64, values: usize): bool {
  const last = blocksNeeded(b);
  if (last > MAX_BLOCKS) return false;
  const sign = b > 0 ? tau : -tau;
  const square = ladderSquare(b);
  const all = reserveF64(4 * <u64>last + 4);
  const workspace = reserveF64(16);
  let count = 0;
  for (let n = -1; n <= last; n++) {
    count += blockLevels(n, sign, square, workspace, all + (<usize>count << 3));
  }
  heapSort(all, count);
  const from = (count >> 1) - (maxIndex + 1);
  for (let i = 0; i < 2 * (maxIndex + 1); i++) put(values, i, at(all, from + i));
  return true;
}
