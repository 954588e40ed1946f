/**
 * Estimated cost of a job in units of which 10⁶ take a millisecond on the reference machine (one core, 2.1 GHz class):
 * measured nanoseconds per level, site, energy and carrier. The definition's `cost` is the same formula as a tree.
 */
import { bias, broadening, carrier, CLOSED_FORM, energy, GAUSSIAN, GRID, gridBox, gridCells, isBilayer, ladderSize, levelCount, LORENTZIAN, maxIndex, method, NO_BROADENING, spinCount, thermalEnergy, v4Ratio, valleyCount } from "./parameters";
import { rowLength } from "./row";

/** Nanoseconds for the levels of one valley. */
function valleyCost(): f64 {
  const levels = <f64>levelCount();
  const top = <f64>maxIndex;
  if (method == CLOSED_FORM) return isBilayer ? 1200 * (top + 2) : 30 * top + 100;
  if (method == GRID) return 7 * gridBox * <f64>gridCells * (300 + 50 * levels);
  if (!isBilayer) return 80 * levels * (2 * <f64>ladderSize + 1);
  const size = ladderSize > 0 ? <f64>ladderSize : 1.5 * Math.max(32, 2 * top);
  return 12 * size * (400 + 20 * levels) + (v4Ratio != 0 ? 150 * size * size : 0);
}

/** Nanoseconds for the occupied part of one level at one energy. */
function occupiedCost(): f64 {
  if (broadening == LORENTZIAN) return thermalEnergy == 0 ? 10 : 35;
  if (broadening == GAUSSIAN) return 10;
  return thermalEnergy == 0 ? 1 : 8;
}

/** One field: its levels in every valley, then what they hold at every energy and carrier density. */
export function rowCost(): f64 {
  const valleysDiffer = isBilayer && bias != 0;
  const distinct = <f64>(spinCount * levelCount() * (valleysDiffer ? valleyCount : 1));
  const lines = broadening == NO_BROADENING ? 0 : 5;
  const held = distinct * (<f64>energy.count * (occupiedCost() + 2 + lines) + 7 * <f64>carrier.count * occupiedCost());
  return <f64>valleyCount * valleyCost() + held + 2 * <f64>rowLength + 1500;
}

/** Copying the rows, and the checks. */
export function assemblyCost(fields: f64): f64 {
  return 12 * <f64>rowLength * fields + 400000;
}
