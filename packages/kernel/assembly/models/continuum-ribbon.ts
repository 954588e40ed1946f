/**
 * Model `continuum-ribbon`: subbands of a Dirac ribbon with edges, field, potential, mass and strain.
 *
 * Staggered grids (grid.ts) make chains and rings, whose levels solvers/ finds and proves; three grids are extrapolated
 * (point.ts, request.ts). A slice is a block of wave numbers of one valley and spin (slice.ts); assemble.ts reduces.
 */
import { fits } from "../arena";
import { fail } from "../diagnostic";
import { MEMORY_EXCEEDED, OK } from "../status";
import { assemble as assembleRibbon } from "./continuum-ribbon/assemble";
import { blockCount, blockEnd, blockStart, expectedLevels, pointWork, totalSlices } from "./continuum-ribbon/blocks";
import { cells, energyAxis, gridCount, kAxis, readParameters, spinCount, stateCount, valleyCount } from "./continuum-ribbon/parameters";
import { computeSlice as computeRibbonSlice } from "./continuum-ribbon/slice";

export function open(): i32 {
  const status = readParameters();
  if (status != OK) return status;
  // densities are held as payload and as result
  const positions = <f64>(2 * cells) * (gridCount == 3 ? 4.0 : 1.0) + 1;
  const densities = 32 * positions * expectedLevels() * <f64>(stateCount * valleyCount * spinCount);
  const levels = 128 * expectedLevels() * <f64>kAxis.count * <f64>(valleyCount * spinCount);
  if (!fits(<u64>Math.min(densities + levels, 1e15))) {
    return fail(MEMORY_EXCEEDED, "The result does not fit into 4 GiB: ask for fewer levels, wave numbers, states or cells.");
  }
  return OK;
}

export function sliceCount(): i32 {
  return totalSlices();
}

export function sliceCost(slice: i32): f64 {
  const block = slice % blockCount();
  return pointWork() * <f64>(blockEnd(block) - blockStart(block) + 1);
}

export function computeSlice(slice: i32): i32 {
  return computeRibbonSlice(slice);
}

export function assembleCost(): f64 {
  return 1e5 + <f64>(valleyCount * spinCount * kAxis.count) * (200 + 4 * <f64>energyAxis.count);
}

export function assemble(): i32 {
  return assembleRibbon();
}
