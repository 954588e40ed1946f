/**
 * One block of the Bernal bilayer's ladder.
 *
 *   H in (A1, B1, A2, B2): [[U/2, vπ⁺, −v₄π⁺, v₃π], [vπ, U/2+Δ, γ₁, −v₄π⁺], [−v₄π, γ₁, −U/2+Δ, vπ⁺], [v₃π⁺, −v₄π, vπ, −U/2]]
 *
 * For τ sgn(B) = +1, π⁺ → w a: block n holds A1|n−1⟩, B1|n⟩, A2|n⟩, B2|n+1⟩, and only v₃ leads out of it, from B2 of
 * block n to A1 of block n + 3. Blocks 0 and −1 lack what has a negative index. For −1 the order B2, A2, B1, A1 gives
 * the same matrix with U → −U (the sign of π is removed by (−1)ⁿ).
 *
 * Source    E. McCann, V. I. Fal'ko, PRL 96, 086805 (2006); E. McCann, M. Koshino, Rep. Prog. Phys. 76, 056503 (2013);
 *           J. M. Pereira, F. M. Peeters, P. Vasilopoulos, PRB 76, 115419 (2007) for the 4-band levels.
 */
import { put } from "../../doubles";
import { bias, dimerOffset, gamma1, v3Ratio, v4Ratio } from "./parameters";

/** Number of states of block n: 4, but 3 for block 0 and 1 for block −1. */
export function blockSize(n: i32): i32 {
  return n > 0 ? 4 : n == 0 ? 3 : 1;
}

/** Diagonal of state c (0 … 3 in the block's full order); sign = τ sgn(B). */
export function blockDiagonal(c: i32, sign: f64): f64 {
  const half = 0.5 * sign * bias;
  return c == 0 ? half : c == 1 ? half + dimerOffset : c == 2 ? dimerOffset - half : -half;
}

/** Element between states c and c + 1 of block n; square = w². */
export function blockNext(c: i32, n: i32, square: f64): f64 {
  return c == 1 ? gamma1 : Math.sqrt(square * <f64>(c == 0 ? n : n + 1));
}

/** Element between states c and c + 2 of block n. */
export function blockSecond(c: i32, n: i32, square: f64): f64 {
  return -v4Ratio * Math.sqrt(square * <f64>(c == 0 ? n : n + 1));
}

/** Element between the last state of block n and the first of block n + 3. */
export function blockToNext(n: i32, square: f64): f64 {
  return v3Ratio * Math.sqrt(square * <f64>(n + 2));
}

/** Writes the dense block n, row-major, and answers its size. */
export function fillBlock(n: i32, sign: f64, square: f64, a: usize): i32 {
  const size = blockSize(n);
  const skip = 4 - size;
  memory.fill(a, 0, <usize>(size * size) << 3);
  for (let i = 0; i < size; i++) {
    const c = i + skip;
    put(a, i * size + i, blockDiagonal(c, sign));
    if (i + 1 < size) {
      const next = blockNext(c, n, square);
      put(a, i * size + i + 1, next);
      put(a, (i + 1) * size + i, next);
    }
    if (i + 2 < size) {
      const second = blockSecond(c, n, square);
      put(a, i * size + i + 2, second);
      put(a, (i + 2) * size + i, second);
    }
  }
  return size;
}
