/**
 * The gap between signed index −1 and 0 over all valleys and spins: from the sampled levels and the refined extrema.
 *
 *   gap = min E₀ − max E₋₁; negative where the bands overlap
 *
 * Not valid with fewer than three increasing wave numbers, where one of the two bands is missing at any k, and in a mass
 * domain, whose chiral mode has no gap.
 */
import { at } from "../../doubles";
import { blockCount, totalSlices } from "./blocks";
import { extremaOf, extremumAt, rowAt } from "./payloads";
import { isMassDomain, kAxis, kIncreases, spinCount, valleyCount } from "./parameters";
import { levelAt, LEVEL_ENERGY, LEVEL_ERROR, positionOf } from "./row";

export let gapValid: bool = false;
export let gapEv: f64 = 0;
export let gapErrorEv: f64 = 0;
export let gapAtEnd: bool = false;
export let gapIsDirect: bool = false;
/** Edge of the valence and of the conduction band: energy and wave number. */
export let valenceEv: f64 = 0;
export let valenceK: f64 = 0;
export let conductionEv: f64 = 0;
export let conductionK: f64 = 0;

let error: f64 = 0;
let series: i32 = 0;

/** Extreme of band `index`; kind +1 its minimum, −1 its maximum. False: missing somewhere. */
function edgeOf(index: i32, kind: f64): bool {
  let bestE: f64 = 0;
  let bestK: f64 = 0;
  let best = -1;
  error = 0;
  let interior = false;
  const lastK = kAxis.count - 1;
  for (let s = 0; s < valleyCount * spinCount; s++) {
    for (let k = 0; k <= lastK; k++) {
      const row = rowAt(s, k);
      const i = positionOf(row, index);
      if (i < 0) return false;
      const energy = at(levelAt(row, i), LEVEL_ENERGY);
      if (best >= 0 && kind * energy >= kind * bestE) continue;
      best = s;
      bestE = energy;
      bestK = kAxis.at(k);
      error = at(levelAt(row, i), LEVEL_ERROR);
      interior = k > 0 && k < lastK;
    }
  }
  for (let slice = 0, n = totalSlices(); slice < n; slice++) {
    for (let i = 0, m = extremaOf(slice); i < m; i++) {
      const extremum = extremumAt(slice, i);
      if (<i32>at(extremum, 0) != index || at(extremum, 4) != kind || kind * at(extremum, 2) >= kind * bestE) continue;
      best = slice / blockCount();
      bestE = at(extremum, 2);
      bestK = at(extremum, 1);
      error = at(extremum, 3);
      interior = true;
    }
  }
  series = best;
  if (!interior) gapAtEnd = true;
  if (kind > 0) {
    conductionEv = bestE;
    conductionK = bestK;
  } else {
    valenceEv = bestE;
    valenceK = bestK;
  }
  return true;
}

export function findGap(): void {
  gapEv = 0;
  gapErrorEv = 0;
  gapAtEnd = false;
  gapIsDirect = false;
  valenceEv = 0;
  valenceK = 0;
  conductionEv = 0;
  conductionK = 0;
  gapValid = kIncreases() && !isMassDomain() && edgeOf(0, 1);
  if (!gapValid) return;
  const conductionError = error;
  const conductionSeries = series;
  gapValid = edgeOf(-1, -1);
  if (!gapValid) return;
  gapEv = conductionEv - valenceEv;
  gapErrorEv = conductionError + error;
  // the same place on the axis to a thousandth of the mean step, in the same valley
  const step = (kAxis.at(kAxis.count - 1) - kAxis.at(0)) / <f64>(kAxis.count - 1);
  gapIsDirect = conductionSeries == series && Math.abs(conductionK - valenceK) <= 1e-3 * step;
}
