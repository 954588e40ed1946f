/**
 * Checks of the certificate: the listed levels of one field against an independent route. Each applies only under its
 * predicate; together they cost a fraction of one field's levels.
 *
 *   0 ladder        closed form against the matrix in the oscillator basis (no crossed field, no v₃)
 *   1 grid          closed form against the staggered grid (one layer, |β| ≤ 0.8)
 *   2 collapse      (E₁ − E₀)/(√2 ħv/l) on the grid against (1 − β²)^¾ (m = 0, 0 < |β| ≤ 0.8)
 *   3 two-band      lowest bilayer level against √2 (√2 ħv/l)²/γ₁ at the lowest field (U = v₃ = v₄ = Δ = 0)
 *   4 zero mode     n = 0 at −τ sgn(B) m, or a bilayer level at −τ sgn(B) U/2
 *   5 carriers      n(E_F(n)) = n
 */
import { at } from "../../doubles";
import { mark, release, reserveF64 } from "../../arena";
import { addCheck } from "../../result";
import { bilayerLevels, blocksNeeded } from "./bilayer";
import { bilayerLadder } from "./bilayer-ladder";
import { crossedRatio, ladderSquare } from "./monolayer";
import { monolayerGrid } from "./monolayer-grid";
import { monolayerLadder } from "./monolayer-ladder";
import { chargeAt } from "./occupation";
import { bias, broadening, carrier, dimerOffset, electricField, gamma1, GRID, isBilayer, levelCount, mass, maxIndex, method, NO_BROADENING, spinCount, spinEnergy, spinFactor, thermalEnergy, v3Ratio, v4Ratio, valleyCount, valleySign } from "./parameters";
import { energiesOffset, errorsOffset, fermiOffset, fermiValidOffset, takeLevels } from "./row";
import { FLUX_QUANTUM } from "../../constants";

/** Ladders longer than this cost more than a check may. */
const LONGEST_LADDER: i32 = 400;
const GRID_CELLS: i32 = 20;
const GRID_BOX: f64 = 8;

/** Largest energy in a ladder of `size` states, eV: the scale of its rounding. */
function ladderScale(b: f64, size: i32): f64 {
  const top = Math.sqrt(ladderSquare(b) * <f64>(size + 1));
  return isBilayer ? top + gamma1 + Math.abs(bias) + Math.abs(dimerOffset) : top + Math.abs(mass);
}

/** Level i of valley `valley` in a row, without its spin energy. */
function listed(row: usize, b: f64, valley: i32, i: i32): f64 {
  return at(row, energiesOffset + valley * spinCount * levelCount() + i) - spinEnergy(0, b);
}

/** Checks of a row whose every level is valid; `lowest` is such a row in the smallest field. */
export function addChecks(row: usize, b: f64, lowest: usize, lowestField: f64): void {
  const room = mark();
  const n = levelCount();
  const closed = reserveF64(n);
  const other = reserveF64(n);
  const errors = reserveF64(n);
  if (isBilayer) {
    bilayerLadderCheck(row, b, closed, other, errors);
    twoBandCheck(lowest, lowestField);
    if (v3Ratio == 0 && bias != 0) bilayerModeCheck(row, b);
  } else {
    if (electricField == 0) monolayerLadderCheck(row, b, other, errors);
    if (Math.abs(crossedRatio(b)) <= 0.8) gridChecks(row, b, other, errors);
  }
  if (broadening != NO_BROADENING || thermalEnergy != 0) carrierCheck(row, b);
  release(room);
}

function monolayerLadderCheck(row: usize, b: f64, ladder: usize, errors: usize): void {
  const size = maxIndex + 2;
  let worst = 0.0;
  let zero = 0.0;
  for (let valley = 0; valley < valleyCount; valley++) {
    if (!monolayerLadder(b, valleySign(valley), size, ladder, errors)) return;
    for (let i = 0; i < levelCount(); i++) worst = Math.max(worst, Math.abs(at(ladder, i) - listed(row, b, valley, i)));
    if (valley == 0) zero = at(ladder, maxIndex);
  }
  const tolerance = 1e-13 * ladderScale(b, size) + gridError(row);
  addCheck(0, worst, 0, tolerance);
  addCheck(4, zero, (b > 0 ? -valleySign(0) : valleySign(0)) * mass, tolerance);
}

/** Zero unless the row itself comes from the grid: then its own largest error. */
function gridError(row: usize): f64 {
  if (method != GRID) return 0;
  let worst = 0.0;
  for (let i = 0; i < valleyCount * levelCount(); i++) worst = Math.max(worst, at(row, errorsOffset + i));
  return worst;
}

/** The row's lowest levels against the grid, or against the closed form when the row is from the grid itself. */
function gridChecks(row: usize, b: f64, values: usize, errors: usize): void {
  const tau = valleySign(0);
  const top = min(maxIndex, 2);
  let worst = 0.0;
  let error = 0.0;
  if (!monolayerGrid(b, tau, top, GRID_CELLS, GRID_BOX, values, errors)) return;
  for (let i = 0; i <= 2 * top; i++) {
    worst = Math.max(worst, Math.abs(at(values, i) - listed(row, b, 0, maxIndex - top + i)));
    error = Math.max(error, at(errors, i));
  }
  const scale = Math.sqrt(ladderSquare(b));
  const tolerance = error + gridError(row) + 1e-9 * scale;
  addCheck(1, worst, 0, tolerance);
  const beta = crossedRatio(b);
  if (mass == 0 && beta != 0 && top > 0) {
    const s = Math.sqrt((1 - beta) * (1 + beta));
    addCheck(2, (at(values, top + 1) - at(values, top)) / scale, s * Math.sqrt(s), tolerance / scale);
  }
}

function bilayerLadderCheck(row: usize, b: f64, closed: usize, ladder: usize, errors: usize): void {
  const size = blocksNeeded(b);
  if (v3Ratio != 0 || size > LONGEST_LADDER) return;
  let worst = 0.0;
  for (let valley = 0; valley < valleyCount; valley++) {
    const tau = valleySign(valley);
    if (!bilayerLevels(b, tau, closed) || !bilayerLadder(b, tau, size, ladder, errors)) return;
    for (let i = 0; i < levelCount(); i++) {
      worst = Math.max(worst, Math.abs(at(ladder, i) - at(closed, i)));
      worst = Math.max(worst, Math.abs(listed(row, b, valley, i) - at(closed, i)));
    }
  }
  addCheck(0, worst, 0, 1e-13 * ladderScale(b, size));
}

function twoBandCheck(row: usize, b: f64): void {
  if (bias != 0 || dimerOffset != 0 || v3Ratio != 0 || v4Ratio != 0 || maxIndex < 1) return;
  const square = ladderSquare(b);
  const small = (3 * square) / (gamma1 * gamma1); // E = E₂(1 − 3w²/2γ₁² + …)
  if (small > 0.1) return;
  const twoBand = (square * 1.4142135623730951) / gamma1;
  // labels −1 and 1 are the zero modes, label 2 is the first of the ladder
  addCheck(3, listed(row, b, 0, maxIndex + 2), twoBand, small * twoBand);
}

function bilayerModeCheck(row: usize, b: f64): void {
  const expected = (b > 0 ? -valleySign(0) : valleySign(0)) * 0.5 * bias;
  let nearest = listed(row, b, 0, 0);
  for (let i = 1; i < levelCount(); i++) {
    const level = listed(row, b, 0, i);
    if (Math.abs(level - expected) < Math.abs(nearest - expected)) nearest = level;
  }
  addCheck(4, nearest, expected, 1e-13 * ladderScale(b, maxIndex + 2));
}

function carrierCheck(row: usize, b: f64): void {
  takeLevels(row, b);
  let worst = 0.0;
  for (let i = 0; i < carrier.count; i++) {
    if (at(row, fermiValidOffset + i) == 0) continue;
    worst = Math.max(worst, Math.abs(chargeAt(at(row, fermiOffset + i)) - carrier.at(i)));
  }
  const capacity = (spinFactor * Math.abs(b) * <f64>(valleyCount * spinCount * levelCount())) / FLUX_QUANTUM;
  addCheck(5, worst, 0, 1e-10 * capacity);
}
