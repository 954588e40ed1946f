/**
 * The levels asked for at one wave number: found, chosen and proved.
 *
 * The index range is found on the coarsest grid and widened until the outermost levels lie outside the request by four
 * times their own discretisation estimate, so that the extrapolated value decides what belongs to it.
 */
import { mark, release } from "../../arena";
import { at, put } from "../../doubles";
import { fail } from "../../diagnostic";
import { INERTIA_MISMATCH, NOT_CONVERGED, OK } from "../../status";
import { chainCounts } from "../../solvers/chain";
import { intAt, putInt } from "../../solvers/chain-brackets";
import { fillChain } from "./grid";
import { isWindow, nearestCount, nearestEnergy, velocity, widthNm, windowMax, windowMin } from "./parameters";
import { Point, solveRange, tieBound } from "./point";
import { chainAt, finestChain, gridAt, Setting } from "./setting";

const shifts: usize = memory.data(64, 16);
const counts: usize = memory.data(32, 16);

/** Signed indices below a … h at once on the coarsest grid. */
function coarseCounts(setting: Setting): bool {
  if (!chainCounts(chainAt(setting, 0), shifts, counts)) return false;
  for (let i = 0; i < 8; i++) putInt(counts, i, intAt(counts, i) - gridAt(setting, 0).half);
  return true;
}

let rangeFirst: i32 = 0;
let rangeEnd: i32 = 0;

/** Index range of the request on the coarsest grid. */
function findRange(setting: Setting, k: f64): bool {
  fillChain(chainAt(setting, 0), gridAt(setting, 0), setting.valley, k);
  if (isWindow) {
    for (let i = 0; i < 8; i++) put(shifts, i, i < 4 ? windowMin : windowMax);
    if (!coarseCounts(setting)) return false;
    rangeFirst = intAt(counts, 0);
    rangeEnd = intAt(counts, 7);
    return true;
  }
  // radii until one holds the levels and not many more
  let radius = setting.radius > 0 ? setting.radius : (velocity * Math.PI * <f64>(nearestCount + 2)) / (4 * widthNm);
  let low: f64 = 0;
  const whole = chainAt(setting, 0).norm + Math.abs(nearestEnergy);
  for (let pass = 0; pass < 60; pass++) {
    for (let i = 0; i < 4; i++) {
      const r = low + (radius - low) * 0.5 * <f64>(i + 1); // ½, 1, 1½, 2 of the way
      put(shifts, 2 * i, nearestEnergy - r);
      put(shifts, 2 * i + 1, nearestEnergy + r);
    }
    if (!coarseCounts(setting)) return false;
    let best = -1;
    for (let i = 0; i < 4 && best < 0; i++) if (intAt(counts, 2 * i + 1) - intAt(counts, 2 * i) >= nearestCount) best = i;
    if (best < 0) {
      low = at(shifts, 7) - nearestEnergy;
      radius = 2 * low;
      if (low > whole) return false;
      continue;
    }
    rangeFirst = intAt(counts, 2 * best);
    rangeEnd = intAt(counts, 2 * best + 1);
    const found = at(shifts, 2 * best + 1) - nearestEnergy;
    if (rangeEnd - rangeFirst <= nearestCount + 6 || pass > 40) {
      setting.radius = found;
      return true;
    }
    // too many: refine between the last radius that held too few and this one
    if (best > 0) low = at(shifts, 2 * best - 1) - nearestEnergy;
    radius = 0.5 * (low + found);
    if (found - low <= 4 * chainAt(setting, 0).tolerance) return true;
  }
  return false;
}

/** Everything asked for at k into `point`. A status. */
export function solvePoint(setting: Setting, point: Point, k: f64): i32 {
  if (!findRange(setting, k)) return fail(NOT_CONVERGED, "No range around the energy holds as many levels as asked for.");
  const coarse = gridAt(setting, 0);
  const least = -coarse.half;
  const most = coarse.n - coarse.half;
  let first = max(least, rangeFirst - 1);
  let end = min(most, rangeEnd + 1);
  for (let widen = 2; ; widen *= 2) {
    const room = mark();
    const status = solveRange(setting, point, k, first, max(1, end - first));
    if (status != OK) return status;
    choose(setting, point);
    const count = point.count;
    const moreBelow = first > least && !clears(point, 0, point.low, 1);
    const moreAbove = end < most && !clears(point, count - 1, point.high, -1);
    if (!moreBelow && !moreAbove) break;
    release(room);
    if (moreBelow) first = max(least, first - widen);
    if (moreAbove) end = min(most, end + widen);
  }
  return prove(setting, point);
}

/** Whether level i lies beyond `edge` by four of its own estimates. `side` 1: below, −1: above. */
function clears(point: Point, i: i32, edge: f64, side: f64): bool {
  const value = at(point.values, i);
  const fine = at(point.fine, i);
  const estimate = Math.max(Math.abs(value - fine), at(point.errors, i));
  const nearest = side > 0 ? Math.max(value, fine) + 4 * estimate : Math.min(value, fine) - 4 * estimate;
  return side > 0 ? nearest < edge : nearest >= edge;
}

/** Marks the levels of the request by their extrapolated values; low and high become its ends. */
function choose(setting: Setting, point: Point): void {
  const tie = tieBound(finestChain(setting));
  const count = point.count;
  point.cut = 0;
  if (isWindow) {
    point.low = windowMin;
    point.high = windowMax;
    for (let i = 0; i < count; i++) {
      // an edge that touches a level moves outward by the bound
      if (Math.abs(at(point.values, i) - windowMin) < tie) point.low = windowMin - tie;
      if (Math.abs(at(point.values, i) - windowMax) < tie) point.high = windowMax + tie;
    }
    for (let i = 0; i < count; i++) {
      const value = at(point.values, i);
      putInt(point.chosen, i, value >= point.low && value < point.high ? 1 : 0);
    }
    return;
  }
  for (let i = 0; i < count; i++) putInt(point.chosen, i, 0);
  let farthest: f64 = 0;
  for (let picked = 0; picked < min(nearestCount, count); picked++) {
    let best = -1;
    for (let i = 0; i < count; i++) {
      if (intAt(point.chosen, i) != 0) continue;
      // strictly nearer beyond the tie bound; within it the lower energy, which comes first
      if (best < 0 || distance(point, i) < distance(point, best) - tie) best = i;
    }
    putInt(point.chosen, best, 1);
    farthest = Math.max(farthest, distance(point, best));
  }
  point.low = nearestEnergy - farthest - tie;
  point.high = nearestEnergy + farthest + tie;
  for (let i = 1; i < count; i++) {
    const same = intAt(point.cluster, i) == intAt(point.cluster, i - 1) || Math.abs(at(point.values, i) - at(point.values, i - 1)) < tie;
    if (same && intAt(point.chosen, i) != intAt(point.chosen, i - 1)) point.cut = 1;
  }
}

@inline
function distance(point: Point, i: i32): f64 {
  return Math.abs(at(point.values, i) - nearestEnergy);
}

/**
 * Counts on the finest grid in the gaps around the chosen levels: as many levels as were solved there. For nearest
 * levels, low and high become the first levels left out on either side: between them nothing is missing.
 */
function prove(setting: Setting, point: Point): i32 {
  const count = point.count;
  const chain = finestChain(setting);
  let from = 0;
  while (from < count && intAt(point.chosen, from) == 0) from++;
  let to = count;
  while (to > from && intAt(point.chosen, to - 1) == 0) to--;
  if (!isWindow) {
    if (from > 0) point.low = at(point.values, from - 1);
    if (to < count) point.high = at(point.values, to);
  }
  if (from == to) {
    // nothing chosen: the gap itself is proved by the two levels around it, which are neighbours by index
    point.wanted = 0;
    point.found = 0;
    return OK;
  }
  // the ends of a cluster stay together
  while (from > 0 && at(point.fine, from) - at(point.fine, from - 1) <= 8 * at(point.proofs, from)) from--;
  while (to < count && at(point.fine, to) - at(point.fine, to - 1) <= 8 * at(point.proofs, to - 1)) to++;
  const below = from > 0 ? 0.5 * (at(point.fine, from - 1) + at(point.fine, from)) : at(point.fine, 0) - 8 * at(point.proofs, 0);
  const above = to < count ? 0.5 * (at(point.fine, to - 1) + at(point.fine, to)) : at(point.fine, to - 1) + 8 * at(point.proofs, to - 1);
  for (let i = 0; i < 8; i++) put(shifts, i, i < 4 ? below : above);
  if (!chainCounts(chain, shifts, counts)) return fail(NOT_CONVERGED, "Counting levels of a ring failed: its elimination grows from every site.");
  point.wanted = intAt(counts, 7) - intAt(counts, 0);
  point.found = to - from;
  if (point.wanted != point.found) return fail(INERTIA_MISMATCH, "The levels found are not as many as the inertia of the matrix proves.");
  return OK;
}
