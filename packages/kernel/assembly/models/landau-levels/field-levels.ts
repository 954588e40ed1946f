/**
 * Levels of one valley in one field by the chosen method, with an error for each.
 *
 *   closed form   8 ε|E|
 *   ladder        half width of the proved interval + what doubling the ladder changes; without a given size it is
 *                 doubled until that change is below 1e-12 of the largest energy of the problem, at most to 2048
 *   grid          half width of the proved interval + the extrapolation's estimate
 *
 * A level whose error exceeds 2 % of the level scale ħv√2/l is marked as not valid, and so is every level where the
 * method finds none: a hole never sinks a job.
 */
import { at, put } from "../../doubles";
import { mark, release, reserveF64 } from "../../arena";
import { EPSILON } from "../../constants";
import { bilayerLevels } from "./bilayer";
import { bilayerLadder } from "./bilayer-ladder";
import { hasLevels, ladderSquare, monolayerLevels } from "./monolayer";
import { monolayerGrid } from "./monolayer-grid";
import { monolayerLadder } from "./monolayer-ladder";
import { bias, CLOSED_FORM, dimerOffset, gamma1, GRID, gridBox, gridCells, isBilayer, ladderSize, levelCount, maxIndex, method } from "./parameters";

const LARGEST_LADDER: i32 = 2048;
const VALID_SHARE: f64 = 0.02;

/** Fills values, errors and valid (0 or 1) of levelCount() levels. */
export function fieldLevels(b: f64, tau: f64, values: usize, errors: usize, valid: usize): void {
  const n = levelCount();
  const room = mark();
  if (!(isBilayer ? b != 0 : hasLevels(b)) || !byMethod(b, tau, values, errors)) {
    for (let i = 0; i < n; i++) clear(i, values, errors, valid);
  } else {
    const limit = VALID_SHARE * Math.sqrt(ladderSquare(b));
    for (let i = 0; i < n; i++) {
      if (at(errors, i) <= limit) put(valid, i, 1);
      else clear(i, values, errors, valid);
    }
  }
  release(room);
}

function clear(i: i32, values: usize, errors: usize, valid: usize): void {
  put(values, i, 0);
  put(errors, i, 0);
  put(valid, i, 0);
}

function byMethod(b: f64, tau: f64, values: usize, errors: usize): bool {
  if (method == CLOSED_FORM) {
    if (isBilayer) {
      if (!bilayerLevels(b, tau, values)) return false;
    } else monolayerLevels(b, tau, values);
    for (let i = 0; i < levelCount(); i++) put(errors, i, 8 * EPSILON * Math.abs(at(values, i)));
    return true;
  }
  if (method == GRID) return monolayerGrid(b, tau, maxIndex, gridCells, gridBox, values, errors);
  if (!isBilayer) return monolayerLadder(b, tau, ladderSize, values, errors);
  return ladderSize > 0 ? bilayerOfSize(b, tau, ladderSize, values, errors) : bilayerConverged(b, tau, values, errors);
}

/** The ladder of the given size, compared with the doubled one. */
function bilayerOfSize(b: f64, tau: f64, size: i32, values: usize, errors: usize): bool {
  const n = levelCount();
  const doubled = reserveF64(n);
  const spare = reserveF64(n);
  if (!bilayerLadder(b, tau, size, values, errors)) return false;
  if (!bilayerLadder(b, tau, 2 * size, doubled, spare)) return false;
  for (let i = 0; i < n; i++) put(errors, i, at(errors, i) + Math.abs(at(doubled, i) - at(values, i)));
  return true;
}

function bilayerConverged(b: f64, tau: f64, values: usize, errors: usize): bool {
  const n = levelCount();
  const last = reserveF64(n);
  const widths = reserveF64(n);
  const target = 1e-12 * (gamma1 + Math.abs(bias) + Math.abs(dimerOffset));
  let size = max(32, 2 * maxIndex);
  if (!bilayerLadder(b, tau, size, values, errors)) return false;
  let change = Infinity;
  while (change > target && size < LARGEST_LADDER) {
    size *= 2;
    memory.copy(last, values, <usize>n << 3);
    const room = mark();
    if (!bilayerLadder(b, tau, size, values, widths)) return false;
    release(room);
    change = 0;
    for (let i = 0; i < n; i++) {
      const step = Math.abs(at(values, i) - at(last, i));
      put(errors, i, at(widths, i) + step);
      change = Math.max(change, step);
    }
  }
  return true;
}
