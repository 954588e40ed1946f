/**
 * One row of a slice's payload: what was found at one wave number. All doubles.
 *
 *   ROW header    k, levels, low, high, cut, wanted, found, largest residual, density points (0: none)
 *   per level     signed index, E, error, estimate (0 none, 1 extrapolated, 2 not), dE/dk, share of K, cluster, residual,
 *                 half width of the proof
 *   densities     per level |A|² then |B|² at the density points
 */
import { release, reserve } from "../../arena";
import { at, put } from "../../doubles";
import { intAt } from "../../solvers/chain-brackets";
import { vectorLength } from "../../solvers/chain-levels";
import { addDensities, positionCount } from "./expectation";
import { Point } from "./point";
import { finest, finestChain, Setting } from "./setting";

export const ROW_HEADER: i32 = 9;
export const LEVEL_DOUBLES: i32 = 9;
export const ROW_K: i32 = 0;
export const ROW_LEVELS: i32 = 1;
export const ROW_LOW: i32 = 2;
export const ROW_HIGH: i32 = 3;
export const ROW_CUT: i32 = 4;
export const ROW_WANTED: i32 = 5;
export const ROW_FOUND: i32 = 6;
export const ROW_RESIDUAL: i32 = 7;
export const ROW_POINTS: i32 = 8;
export const LEVEL_INDEX: i32 = 0;
export const LEVEL_ENERGY: i32 = 1;
export const LEVEL_ERROR: i32 = 2;
export const LEVEL_ESTIMATE: i32 = 3;
export const LEVEL_VELOCITY: i32 = 4;
export const LEVEL_SHARE: i32 = 5;
export const LEVEL_CLUSTER: i32 = 6;
export const LEVEL_RESIDUAL: i32 = 7;
export const LEVEL_PROOF: i32 = 8;

@inline
export function rowLevels(row: usize): i32 {
  return <i32>at(row, ROW_LEVELS);
}
@inline
export function levelAt(row: usize, i: i32): usize {
  return row + (<usize>(ROW_HEADER + i * LEVEL_DOUBLES) << 3);
}
/** Doubles of a row. */
export function rowDoubles(row: usize): i32 {
  const levels = rowLevels(row);
  return ROW_HEADER + levels * (LEVEL_DOUBLES + 2 * <i32>at(row, ROW_POINTS));
}
/** Densities of level i: |A|² at the points, then |B|². */
export function densityOf(row: usize, i: i32): usize {
  const points = <i32>at(row, ROW_POINTS);
  return levelAt(row, rowLevels(row)) + (<usize>(2 * points * i) << 3);
}

/** Position in the row of the level with this signed index, or −1. Indices of a row increase. */
export function positionOf(row: usize, index: i32): i32 {
  for (let i = 0, n = rowLevels(row); i < n; i++) if (<i32>at(levelAt(row, i), LEVEL_INDEX) == index) return i;
  return -1;
}

/** dE/dk to the right of k: in a cluster of crossing levels they are ascending, as stored. */
@inline
export function rightVelocity(row: usize, i: i32): f64 {
  return at(levelAt(row, i), LEVEL_VELOCITY);
}
/** dE/dk to the left of k: descending within the cluster. */
export function leftVelocity(row: usize, i: i32): f64 {
  const cluster = at(levelAt(row, i), LEVEL_CLUSTER);
  let first = i;
  while (first > 0 && at(levelAt(row, first - 1), LEVEL_CLUSTER) == cluster) first--;
  let last = i;
  const n = rowLevels(row);
  while (last + 1 < n && at(levelAt(row, last + 1), LEVEL_CLUSTER) == cluster) last++;
  return at(levelAt(row, first + last - i), LEVEL_VELOCITY);
}

/** Packs the chosen levels of a point above the arena's top; the caller moves the row down. */
export function packRow(setting: Setting, point: Point, withDensities: bool): usize {
  let levels = 0;
  for (let i = 0; i < point.count; i++) levels += intAt(point.chosen, i);
  const points = withDensities ? positionCount(finest(setting)) : 0;
  const row = reserve(<u64>(ROW_HEADER + levels * (LEVEL_DOUBLES + 2 * points)) << 3);
  put(row, ROW_K, point.k);
  put(row, ROW_LEVELS, <f64>levels);
  put(row, ROW_LOW, point.low);
  put(row, ROW_HIGH, point.high);
  put(row, ROW_CUT, <f64>point.cut);
  put(row, ROW_WANTED, <f64>point.wanted);
  put(row, ROW_FOUND, <f64>point.found);
  put(row, ROW_POINTS, <f64>points);
  let worst: f64 = 0;
  for (let i = 0, to = 0, first = -1, cluster = -1; i < point.count; i++) {
    if (intAt(point.chosen, i) == 0) continue;
    if (first < 0 || intAt(point.cluster, i) != cluster) {
      first = to;
      cluster = intAt(point.cluster, i);
    }
    const level = levelAt(row, to);
    put(level, LEVEL_INDEX, <f64>(point.first + i));
    put(level, LEVEL_ENERGY, at(point.values, i));
    put(level, LEVEL_ERROR, at(point.errors, i));
    put(level, LEVEL_ESTIMATE, <f64>intAt(point.estimated, i));
    put(level, LEVEL_VELOCITY, at(point.velocities, i));
    put(level, LEVEL_SHARE, at(point.shares, i));
    put(level, LEVEL_CLUSTER, <f64>first);
    put(level, LEVEL_RESIDUAL, at(point.residuals, i));
    put(level, LEVEL_PROOF, at(point.proofs, i));
    worst = Math.max(worst, at(point.residuals, i));
    to++;
  }
  put(row, ROW_RESIDUAL, worst);
  if (withDensities) fillDensities(setting, point, row, points);
  return row;
}

/** Densities averaged over clusters: members that were left out of the request count too. */
function fillDensities(setting: Setting, point: Point, row: usize, points: i32): void {
  const chain = finestChain(setting);
  const size = <usize>vectorLength(chain) << 3;
  for (let i = 0, to = 0; i < point.count; i++) {
    if (intAt(point.chosen, i) == 0) continue;
    const a = densityOf(row, to++);
    memory.fill(a, 0, <usize>points << 4);
    let members = 0;
    for (let m = 0; m < point.count; m++) if (intAt(point.cluster, m) == intAt(point.cluster, i)) members++;
    for (let m = 0; m < point.count; m++) {
      if (intAt(point.cluster, m) != intAt(point.cluster, i)) continue;
      addDensities(chain, finest(setting), point.vectors + <usize>m * size, 1 / <f64>members, a, a + (<usize>points << 3));
    }
  }
}

/** Moves a packed row down to `to` (a mark): the room above is given back. Answers its address. */
export function keepRow(row: usize, to: usize): usize {
  const bytes = <usize>rowDoubles(row) << 3;
  release(to);
  const kept = reserve(bytes);
  memory.copy(kept, row, bytes);
  return kept;
}

