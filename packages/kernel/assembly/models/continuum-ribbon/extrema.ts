/**
 * Extrema of subbands between two neighbouring wave numbers, found where dE/dk changes its sign: never read off the axis.
 *
 * Trial points alternate between the zero of the secant of dE/dk (exact for a parabola) and the intersection of the two
 * tangents (exact for a crossing, where dE/dk jumps); after two trials that do not halve the bracket it is halved. With
 * a band convex towards the extremum, its value lies between the best value found and the tangents' intersection: their
 * difference is the error.
 *
 * Source    safeguarded secant as R. P. Brent (1973) ch. 4; tangent bound: convexity (own derivation).
 * Output    per extremum EXTREMUM_DOUBLES doubles: signed index, k, E, error of E, +1 minimum / −1 maximum.
 * Cost      each trial is one solve of three levels on every grid; 3 to 8 trials.
 */
import { mark, release, reserve, reserveF64 } from "../../arena";
import { at, put } from "../../doubles";
import { OK } from "../../status";
import { intAt } from "../../solvers/chain-brackets";
import { velocity } from "./parameters";
import { Point, solveRange } from "./point";
import { finestChain, gridAt, Setting } from "./setting";
import { leftVelocity, levelAt, LEVEL_ENERGY, LEVEL_ERROR, LEVEL_INDEX, positionOf, rightVelocity, ROW_K, rowLevels } from "./row";

export const EXTREMUM_DOUBLES: i32 = 5;
const MAX_TRIALS: i32 = 40;

/** A slope below this is 0: the extremum is the grid point itself. */
@inline
function flat(): f64 {
  return 1e-9 * velocity;
}

// the level that `evaluate` found
let energy: f64 = 0;
let error: f64 = 0;
let leftSlope: f64 = 0;
let rightSlope: f64 = 0;

function evaluate(setting: Setting, index: i32, k: f64): i32 {
  const room = mark();
  const grid = gridAt(setting, 0);
  const first = max(index - 1, -grid.half);
  const end = min(index + 2, grid.n - grid.half);
  const point = changetype<Point>(reserve(offsetof<Point>()));
  const status = solveRange(setting, point, k, first, end - first);
  if (status != OK) return status;
  const i = index - first;
  energy = at(point.values, i);
  error = at(point.errors, i);
  let low = i;
  let high = i;
  while (low > 0 && intAt(point.cluster, low - 1) == intAt(point.cluster, i)) low--;
  while (high + 1 < point.count && intAt(point.cluster, high + 1) == intAt(point.cluster, i)) high++;
  rightSlope = at(point.velocities, i);
  leftSlope = at(point.velocities, low + high - i);
  release(room);
  return OK;
}

/** Refines one extremum of band `index` in (a, b); kind +1 minimum, −1 maximum. Writes five doubles to `to`. A status. */
function refine(
  setting: Setting, index: i32, kind: f64, a: f64, ea: f64, va: f64, b: f64, eb: f64, vb: f64, errorOfEnds: f64, to: usize,
): i32 {
  let bestK = kind * ea < kind * eb ? a : b;
  let bestE = kind * ea < kind * eb ? ea : eb;
  let levelError = errorOfEnds;
  let gap: f64 = Infinity;
  let slow = 0;
  for (let trial = 0; trial < MAX_TRIALS; trial++) {
    const width = b - a;
    const crossing = (eb - ea + va * a - vb * b) / (va - vb);
    const tangent = ea + va * (crossing - a);
    gap = Math.abs(bestE - tangent);
    if (gap <= 4 * levelError + 8 * finestChain(setting).tolerance) break;
    let k = trial & 1 ? crossing : a + (width * va) / (va - vb);
    if (slow >= 2 || !(k > a && k < b)) {
      k = 0.5 * (a + b);
      slow = 0;
    }
    if (!(k > a && k < b)) break; // neighbouring doubles
    const status = evaluate(setting, index, k);
    if (status != OK) return status;
    if (kind * energy < kind * bestE) {
      bestE = energy;
      bestK = k;
      levelError = error;
    }
    if (kind * leftSlope <= flat() && kind * rightSlope >= -flat()) {
      gap = 0; // flat, or a crossing exactly here
      bestE = energy;
      bestK = k;
      levelError = error;
      break;
    }
    if (kind * rightSlope < 0) {
      a = k;
      ea = energy;
      va = rightSlope;
    } else {
      b = k;
      eb = energy;
      vb = leftSlope;
    }
    slow = b - a > 0.5 * width ? slow + 1 : 0;
  }
  put(to, 0, <f64>index);
  put(to, 1, bestK);
  put(to, 2, bestE);
  put(to, 3, levelError + gap);
  put(to, 4, kind);
  return OK;
}

export let extremaCount: i32 = 0;
export let extremaStatus: i32 = OK;

/** All extrema between two rows: `extremaCount` records at the address returned, `extremaStatus` when a solve failed. */
export function findExtrema(setting: Setting, left: usize, right: usize): usize {
  const n = rowLevels(left);
  const found = reserveF64(max(1, n * EXTREMUM_DOUBLES));
  extremaCount = 0;
  extremaStatus = OK;
  for (let i = 0; i < n; i++) {
    const here = levelAt(left, i);
    const j = positionOf(right, <i32>at(here, LEVEL_INDEX));
    if (j < 0) continue;
    const there = levelAt(right, j);
    const va = rightVelocity(left, i);
    const vb = leftVelocity(right, j);
    const kind: f64 = va < -flat() && vb > flat() ? 1 : va > flat() && vb < -flat() ? -1 : 0;
    if (kind == 0) continue;
    const errors = Math.max(at(here, LEVEL_ERROR), at(there, LEVEL_ERROR));
    extremaStatus = refine(
      setting, <i32>at(here, LEVEL_INDEX), kind, at(left, ROW_K), at(here, LEVEL_ENERGY), va,
      at(right, ROW_K), at(there, LEVEL_ENERGY), vb, errors, found + (<usize>(extremaCount * EXTREMUM_DOUBLES) << 3),
    );
    if (extremaStatus != OK) return found;
    extremaCount++;
  }
  return found;
}
