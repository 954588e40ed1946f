/**
 * Model `continuum-ribbon`: subbands of a Dirac ribbon with edges, field, potential, mass and strain.
 *
 * Staggered grids (grid.ts) make chains and rings, whose levels solvers/ finds and proves; three grids are extrapolated
 * (point.ts). A slice is a block of wave numbers of one valley and spin (slice.ts); assemble.ts reduces.
 */
import { assemble as assembleRibbon } from "./continuum-ribbon/assemble";
import { blockCount, blockEnd, blockStart, pointWork, totalSlices } from "./continuum-ribbon/blocks";
import { energyAxis, kAxis, readParameters, spinCount, valleyCount } from "./continuum-ribbon/parameters";
import { computeSlice as computeRibbonSlice } from "./continuum-ribbon/slice";

export function open(): i32 {
  return readParameters();
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
