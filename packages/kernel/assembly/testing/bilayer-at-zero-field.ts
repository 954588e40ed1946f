/**
 * The bilayer's 4×4 Hamiltonian at zero field, from the same elements as the ladder blocks (bilayer-block.ts): the
 * couplings √(w² n) give way to ħv|q| and its phases. Complex Hermitian, diagonalised as an 8×8 real symmetric matrix
 * [[Re, −Im], [Im, Re]] whose levels come in pairs.
 */
import { reserveF64 } from "../arena";
import { at, put } from "../doubles";
import { jacobiValues } from "../linalg/jacobi";
import { blockDiagonal, fillBlock } from "../models/landau-levels/bilayer-block";
import { gamma1, v3Ratio, v4Ratio, velocity } from "../models/landau-levels/parameters";

function set(a: usize, i: i32, j: i32, re: f64, im: f64): void {
  put(a, 8 * i + j, re);
  put(a, 8 * j + i, re);
  put(a, 8 * (i + 4) + j + 4, re);
  put(a, 8 * (j + 4) + i + 4, re);
  put(a, 8 * i + j + 4, -im);
  put(a, 8 * j + i + 4, im);
  put(a, 8 * (i + 4) + j, im);
  put(a, 8 * (j + 4) + i, -im);
}

/** Four energies at (qx, qy) of valley tau, for the parameters of the open record. Order A1, B1, A2, B2. */
export function bilayerAtZeroField(tau: f64, qx: f64, qy: f64, values: usize): void {
  const a = reserveF64(64);
  const all = reserveF64(8);
  memory.fill(a, 0, 512);
  const re = velocity * tau * qx; // v π = ħv(τ qx + i qy)
  const im = velocity * qy;
  for (let c = 0; c < 4; c++) set(a, c, c, blockDiagonal(c, 1), 0);
  set(a, 0, 1, re, -im);
  set(a, 1, 2, gamma1, 0);
  set(a, 2, 3, re, -im);
  set(a, 0, 2, -v4Ratio * re, v4Ratio * im);
  set(a, 1, 3, -v4Ratio * re, v4Ratio * im);
  set(a, 0, 3, v3Ratio * re, v3Ratio * im);
  jacobiValues(a, 8, all);
  for (let c = 0; c < 4; c++) put(values, c, at(all, 2 * c));
}

/** Levels of ladder block n for τ sgn(B) = sign and w² = square; answers their number. */
export function bilayerBlockLevels(n: i32, sign: f64, square: f64, values: usize): i32 {
  const a = reserveF64(16);
  const size = fillBlock(n, sign, square, a);
  jacobiValues(a, size, values);
  return size;
}
