/**
 * Optical transitions |n| → |n| ± 1 between the listed levels, upwards in label: per j the interband pair −(j+1) → j and
 * −j → j+1, and for j ≥ 1 the intraband pair j → j+1 and −(j+1) → −j. Two layers count from half filling (labels ±1, …).
 *
 * Source    V. P. Gusynin, S. G. Sharapov, J. P. Carbotte, PRL 98, 157402 (2007) for the selection rule.
 */
import { isBilayer, maxIndex } from "./parameters";

export function transitionCount(): i32 {
  return isBilayer ? 4 * maxIndex : maxIndex > 0 ? 4 * maxIndex - 2 : 0;
}

/** Label of the initial level of transition t. */
export function transitionFrom(t: i32): i32 {
  const j = quarter(t);
  const kind = part(t);
  return kind == 0 || kind == 3 ? -(j + 1) : kind == 1 ? -j : j;
}

/** Label of the final level of transition t. */
export function transitionTo(t: i32): i32 {
  const j = quarter(t);
  const kind = part(t);
  return kind == 0 ? j : kind == 3 ? -j : j + 1;
}

/** Position of a label in the list of levels. */
export function positionOf(label: i32): i32 {
  if (!isBilayer) return label + maxIndex;
  return label < 0 ? label + maxIndex + 1 : label + maxIndex;
}

/** One layer begins with the two transitions of j = 0; every later j has four. */
function quarter(t: i32): i32 {
  return isBilayer ? t / 4 + 1 : (t + 2) / 4;
}
function part(t: i32): i32 {
  return isBilayer ? t % 4 : t < 2 ? t : (t + 2) % 4;
}
