/**
 * How a job is cut: the k axis of every valley and spin into blocks of nearly equal length. The same expressions stand
 * in the definition (sliceCount, cost), so that an estimate needs no kernel; only + − × ÷ and floor.
 */
import { cells, edge, gridCount, isWindow, kAxis, nearestCount, spinCount, valleyCount, velocity, widthNm, windowMax, windowMin, ARMCHAIR, PERIODIC } from "./parameters";

/** Longest and shortest block, and the work after which a block is ended (operations; 1e9 are about a second). */
const LONGEST: f64 = 24;
const SHORTEST: f64 = 4;
const BLOCK_WORK: f64 = 1e9;

/** Levels expected at one k: asked for, or the mean number of subbands in the window, and the margins. */
export function expectedLevels(): f64 {
  if (!isWindow) return <f64>nearestCount + 4;
  const length = edge == ARMCHAIR ? 2 * widthNm : widthNm;
  return Math.min(((windowMax - windowMin) * length) / (3 * velocity), 2 * <f64>cells) + 4;
}

/** Operations per site: per level, and for counts and setting up; 1e6 are one millisecond where they were calibrated. */
const OPEN_WORK: f64 = 18;
const OPEN_BASE: f64 = 80;
const RING_WORK: f64 = 40;
const RING_BASE: f64 = 140;

/** Estimated operations of one wave number. */
export function pointWork(): f64 {
  const sites = 2 * <f64>cells * (gridCount == 3 ? 7.0 : 1.0);
  const ring = edge == ARMCHAIR || edge == PERIODIC;
  return sites * (expectedLevels() * (ring ? RING_WORK : OPEN_WORK) + (ring ? RING_BASE : OPEN_BASE)) + 20000;
}

export function blockCount(): i32 {
  const longest = Math.min(LONGEST, Math.max(SHORTEST, Math.floor(BLOCK_WORK / pointWork())));
  return <i32>Math.floor((<f64>kAxis.count + longest - 1) / longest);
}
export function blockStart(block: i32): i32 {
  return <i32>((<i64>block * <i64>kAxis.count) / <i64>blockCount());
}
export function blockEnd(block: i32): i32 {
  return blockStart(block + 1);
}
export function totalSlices(): i32 {
  return valleyCount * spinCount * blockCount();
}
