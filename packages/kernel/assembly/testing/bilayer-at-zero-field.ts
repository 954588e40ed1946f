/**
 * The bilayer's 4×4 Hamiltonian at zero field, from the same elements as the ladder blocks (bilayer-block.ts): the
 * couplings √(w² n) give way to ħv|q| and its phases.
 */
import { reserveF64 } from "../arena";
import { put } from "../doubles";
import { blockDiagonal, fillBlock } from "../models/landau-levels/bilayer-block";
import { gamma1, v3Ratio, v4Ratio, velocity } from "../models/landau-levels/parameters";
import { jacobiEigenvalues } from "../solvers/jacobi";
import { realJacobi } from "../solvers/real-jacobi";

function set(a: usize, i: i32, j: i32, re: f64, im: f64): void {
  put(a, 2 * (4 * i + j), re);
  put(a, 2 * (4 * i + j) + 1, im);
  put(a, 2 * (4 * j + i), re);
  put(a, 2 * (4 * j + i) + 1, -im);
}

/** Four energies at (qx, qy) of valley tau, for the parameters of the open record. Order A1, B1, A2, B2. */
export function bilayerAtZeroField(tau: f64, qx: f64, qy: f64, values: usize): void {
  const a = reserveF64(32);
  memory.fill(a, 0, 256);
  const re = velocity * tau * qx; // v π = ħv(τ qx + i qy)
  const im = velocity * qy;
  for (let c = 0; c < 4; c++) set(a, c, c, blockDiagonal(c, 1), 0);
  set(a, 0, 1, re, -im);
  set(a, 1, 2, gamma1, 0);
  set(a, 2, 3, re, -im);
  set(a, 0, 2, -v4Ratio * re, v4Ratio * im);
  set(a, 1, 3, -v4Ratio * re, v4Ratio * im);
  set(a, 0, 3, v3Ratio * re, v3Ratio * im);
  jacobiEigenvalues(4, a, values);
}

/** Levels of ladder block n for τ sgn(B) = sign and w² = square; answers their number. */
export function bilayerBlockLevels(n: i32, sign: f64, square: f64, values: usize): i32 {
  const a = reserveF64(16);
  const size = fillBlock(n, sign, square, a);
  realJacobi(a, size, values);
  return size;
}
