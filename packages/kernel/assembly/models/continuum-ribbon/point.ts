/**
 * Levels of one valley, spin and wave number: by signed index on every grid, extrapolated, chosen, and proved.
 *
 * The index range is found on the coarsest grid and widened until the outermost levels lie outside the request by four
 * times their own discretisation estimate, so that the extrapolated value decides what belongs to it.
 */
import { mark, release, reserve, reserveF64 } from "../../arena";
import { EPSILON } from "../../constants";
import { at, put } from "../../doubles";
import { fail } from "../../diagnostic";
import { INERTIA_MISMATCH, NOT_CONVERGED, OK } from "../../status";
import { Chain, chainCounts } from "../../solvers/chain";
import { intAt, putInt } from "../../solvers/chain-brackets";
import { levelsByIndex, vectorLength } from "../../solvers/chain-levels";
import { clusterSize, levelVectors } from "../../solvers/chain-vectors";
import { clusterVelocities, valleyShare } from "./expectation";
import { extrapolate, limitError, limitHolds, limitValue } from "./extrapolate";
import { chainOf, fillChain, Grid, makeGrid, siteCount } from "./grid";
import {
  cells, gridCount, isWindow, nearestCount, nearestEnergy, spinShift, valleySign, velocity, widthNm, windowMax, windowMin,
} from "./parameters";

/** The grids and chains of one valley and spin, shared by the points of a slice. */
@unmanaged
export class Setting {
  row: i32;
  valley: f64;
  grids: usize; // up to three Grid addresses, u32
  chains: usize;
  /** Radius that held the nearest levels at the last point. */
  radius: f64;
  /** Levels and slopes of the last point per grid, by signed index: guesses for the next one. */
  lastK: f64;
  lastFirst: i32;
  lastCount: i32;
  lastCapacity: i32;
  lastLevels: usize;
  lastSlopes: usize;
}

export function newSetting(valleyRow: i32, spinRow: i32): Setting {
  const setting = changetype<Setting>(reserve(offsetof<Setting>()));
  setting.row = valleyRow;
  setting.valley = valleySign(valleyRow);
  setting.grids = reserve(16);
  setting.chains = reserve(16);
  setting.radius = 0;
  setting.lastCount = 0;
  setting.lastCapacity = siteCount(cells);
  setting.lastLevels = reserveF64(3 * <u64>setting.lastCapacity);
  setting.lastSlopes = reserveF64(3 * <u64>setting.lastCapacity);
  for (let g = 0; g < gridCount; g++) {
    const grid = makeGrid(cells << g, setting.valley, spinShift(spinRow));
    store<u32>(setting.grids + (<usize>g << 2), <u32>changetype<usize>(grid));
    store<u32>(setting.chains + (<usize>g << 2), <u32>changetype<usize>(chainOf(grid)));
  }
  return setting;
}

@inline
export function gridAt(setting: Setting, g: i32): Grid {
  return changetype<Grid>(<usize>load<u32>(setting.grids + (<usize>g << 2)));
}
@inline
export function chainAt(setting: Setting, g: i32): Chain {
  return changetype<Chain>(<usize>load<u32>(setting.chains + (<usize>g << 2)));
}
/** The finest grid and its chain, left filled by the last solve. */
export function finest(setting: Setting): Grid {
  return gridAt(setting, gridCount - 1);
}
export function finestChain(setting: Setting): Chain {
  return chainAt(setting, gridCount - 1);
}

@unmanaged
export class Point {
  k: f64;
  /** Signed index of the first level solved (0 is the lowest conduction level), and how many. */
  first: i32;
  count: i32;
  /** Extrapolated levels, their errors, whether the estimate holds (i32). */
  values: usize;
  errors: usize;
  estimated: usize;
  velocities: usize;
  /** Share of valley K, averaged over clusters. */
  shares: usize;
  residuals: usize;
  /** Half width of the interval in which counts prove the level on the finest grid. */
  proofs: usize;
  cluster: usize;
  /** Level on the finest grid, and its vector. */
  fine: usize;
  vectors: usize;
  /** 1 where the level belongs to the request (i32). */
  chosen: usize;
  /** Where the list is complete. */
  low: f64;
  high: f64;
  cut: i32;
  wanted: i32;
  found: i32;
}

/** Energies closer than this count as equal: 8 n ε ‖H‖. */
@inline
export function tieBound(chain: Chain): f64 {
  return 8 * <f64>chain.n * EPSILON * chain.norm;
}

/** Solves levels first … first + count − 1 (signed) at k on all grids. A status. */
export function solveRange(setting: Setting, point: Point, k: f64, first: i32, count: i32): i32 {
  point.k = k;
  point.first = first;
  point.count = count;
  point.values = reserveF64(count);
  point.errors = reserveF64(count);
  point.estimated = reserve(<u64>count * 4);
  point.velocities = reserveF64(count);
  point.shares = reserveF64(count);
  point.residuals = reserveF64(count);
  point.proofs = reserveF64(count);
  point.cluster = reserve(<u64>count * 4);
  point.chosen = reserve(<u64>count * 4);
  const levels = reserveF64(3 * count); // per grid
  const slopes = reserveF64(3 * count);
  const guesses = reserveF64(count);
  const fresh = reserve(<u64>count * 4);
  const row = <usize>count << 3;
  for (let g = 0; g < gridCount; g++) {
    const chain = chainAt(setting, g);
    const room = mark();
    fillChain(chain, gridAt(setting, g), setting.valley, k);
    const here = levels + <usize>g * row;
    const vectors = reserveF64(<u64>count * vectorLength(chain));
    const guessed = guessLevels(setting, g, k, first, count, levels, guesses);
    if (!levelsByIndex(chain, first + gridAt(setting, g).half, count, guessed ? guesses : 0, here, point.proofs, vectors, fresh)) {
      return fail(NOT_CONVERGED, "Counting levels of a ring failed: its elimination grows from every site.");
    }
    if (!levelVectors(chain, count, here, point.proofs, vectors, fresh, point.residuals, point.cluster)) {
      return fail(NOT_CONVERGED, "The residual of a level stays above its bound.");
    }
    for (let i = 0; i < count; ) {
      const members = clusterSize(point.cluster, count, i);
      if (!clusterVelocities(chain, setting.valley, i, members, vectors, slopes + <usize>g * row)) {
        return fail(NOT_CONVERGED, "dE/dk of a cluster did not converge.");
      }
      i += members;
    }
    if (g == gridCount - 1) {
      point.vectors = vectors;
      point.fine = here;
      fillShares(setting, point, chain, vectors);
    } else {
      release(room);
    }
  }
  remember(setting, k, first, count, levels, slopes);
  combine(setting, point, levels, slopes);
  return OK;
}

/**
 * Where the levels of grid g should lie: along the last point's slope, and off it by as much as the coarser grid was;
 * without a last point, on the third grid, by the second-order law of the first two. False: no guess.
 */
function guessLevels(setting: Setting, g: i32, k: f64, first: i32, count: i32, levels: usize, guesses: usize): bool {
  const row = <usize>count << 3;
  const known = setting.lastCount > 0 && first >= setting.lastFirst && first + count <= setting.lastFirst + setting.lastCount;
  if (!known) {
    if (g != 2) return false;
    for (let i = 0; i < count; i++) {
      const second = at(levels + row, i);
      put(guesses, i, second + 0.25 * (second - at(levels, i)));
    }
    return true;
  }
  const skip = first - setting.lastFirst;
  for (let i = 0; i < count; i++) {
    let guess = along(setting, g, skip + i, k);
    if (g > 0) guess += at(levels + <usize>(g - 1) * row, i) - along(setting, g - 1, skip + i, k);
    put(guesses, i, guess);
  }
  return true;
}

@inline
function along(setting: Setting, g: i32, i: i32, k: f64): f64 {
  const offset = <usize>g * <usize>setting.lastCapacity * 8;
  return at(setting.lastLevels + offset, i) + at(setting.lastSlopes + offset, i) * (k - setting.lastK);
}

function remember(setting: Setting, k: f64, first: i32, count: i32, levels: usize, slopes: usize): void {
  setting.lastK = k;
  setting.lastFirst = first;
  setting.lastCount = min(count, setting.lastCapacity);
  const bytes = <usize>setting.lastCount << 3;
  for (let g = 0; g < gridCount; g++) {
    const offset = <usize>g * <usize>setting.lastCapacity * 8;
    memory.copy(setting.lastLevels + offset, levels + <usize>g * <usize>count * 8, bytes);
    memory.copy(setting.lastSlopes + offset, slopes + <usize>g * <usize>count * 8, bytes);
  }
}

function fillShares(setting: Setting, point: Point, chain: Chain, vectors: usize): void {
  const size = <usize>vectorLength(chain) << 3;
  for (let i = 0; i < point.count; ) {
    const members = clusterSize(point.cluster, point.count, i);
    let sum: f64 = 0;
    for (let m = i; m < i + members; m++) sum += valleyShare(chain, setting.row, vectors + <usize>m * size);
    for (let m = i; m < i + members; m++) put(point.shares, m, sum / <f64>members);
    i += members;
  }
}

/** Extrapolates levels and velocities, or takes the single grid. */
function combine(setting: Setting, point: Point, levels: usize, slopes: usize): void {
  const count = point.count;
  const row = <usize>count << 3;
  const chain = finestChain(setting);
  for (let i = 0; i < count; i++) {
    if (gridCount == 1) {
      put(point.values, i, at(levels, i));
      put(point.errors, i, 0);
      putInt(point.estimated, i, 0);
      put(point.velocities, i, at(slopes, i));
      continue;
    }
    const h1 = gridAt(setting, 0).h, h2 = gridAt(setting, 1).h, h3 = gridAt(setting, 2).h;
    extrapolate(at(levels, i), at(levels + row, i), at(levels + 2 * row, i), h1, h2, h3, 32 * chain.tolerance);
    put(point.values, i, limitValue);
    put(point.errors, i, limitError);
    putInt(point.estimated, i, limitHolds ? 1 : 2);
    extrapolate(at(slopes, i), at(slopes + row, i), at(slopes + 2 * row, i), h1, h2, h3, 1e-9 * velocity);
    put(point.velocities, i, limitValue);
  }
}

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
