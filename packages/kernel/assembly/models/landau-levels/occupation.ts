/**
 * What a list of levels holds in a field: density of states, charge density, Hall plateaus and the Fermi energy.
 *
 *   n(E) = g (Σ_j w_j P(E − e_j) − ½ Σ_j w_j),  g = spin factor · |B|/(h/e) per level, valley and spin
 *
 * Neutral is half of all listed levels over all valleys and spins: with both valleys the middle of the gap; with one
 * valley the half-filled n = 0 level (its parity anomaly). Levels of equal energy are merged with their weights.
 *
 * Source    V. P. Gusynin, S. G. Sharapov, PRL 95, 146801 (2005); line shapes: line-shape.ts; roots:
 *           bracketed-root.ts.
 * Accuracy  n(E) to 1e-14 of the listed total; the Fermi energy to a few ε, or n to 1e-13 of the total where flat.
 */
import { at, put } from "../../doubles";
import { FLUX_QUANTUM } from "../../constants";
import { bracketedRoot } from "../../functions/bracketed-root";
import { heapSort } from "../../linalg/heap-sort";
import { lineDensity, occupiedPart } from "./line-shape";
import { broadening, NO_BROADENING, spinFactor, thermalEnergy } from "./parameters";

let count: i32 = 0;
let energies: usize = 0;
let weights: usize = 0;
/** Energies between which the Fermi energy is sought, and the charge there: every level and every middle. */
let nodeCount: i32 = 0;
let nodes: usize = 0;
let charges: usize = 0;
let total: f64 = 0;
let perLevel: f64 = 0;

/** Takes `n` levels (sorted in place) in the field b (T); `room` = 6n + 2 doubles. */
export function setLevels(levels: usize, n: i32, b: f64, room: usize): void {
  heapSort(levels, n);
  energies = room;
  weights = room + (<usize>n << 3);
  nodes = room + (<usize>n << 4);
  charges = nodes + (<usize>(2 * n + 1) << 3);
  perLevel = (spinFactor * Math.abs(b)) / FLUX_QUANTUM;
  total = <f64>n;
  count = 0;
  for (let i = 0; i < n; i++) {
    const level = at(levels, i);
    if (count > 0 && at(energies, count - 1) == level) put(weights, count - 1, at(weights, count - 1) + 1);
    else {
      put(energies, count, level);
      put(weights, count++, 1);
    }
  }
}

/** States per eV and nm². */
export function densityAt(energy: f64): f64 {
  let sum = 0.0;
  for (let j = 0; j < count; j++) sum += at(weights, j) * lineDensity(energy - at(energies, j));
  return perLevel * sum;
}

/** Electrons per nm², counted from neutrality, at the Fermi energy `energy`. */
export function chargeAt(energy: f64): f64 {
  let sum = -0.5 * total;
  for (let j = 0; j < count; j++) sum += at(weights, j) * occupiedPart(energy - at(energies, j));
  return perLevel * sum;
}

/** Hall conductance in e²/h of sharp levels at zero temperature; a level at `energy` itself counts half. */
export function plateauAt(energy: f64): f64 {
  let sum = -0.5 * total;
  for (let j = 0; j < count && at(energies, j) <= energy; j++) {
    sum += at(energies, j) == energy ? 0.5 * at(weights, j) : at(weights, j);
  }
  return spinFactor * sum;
}

/** Prepares `fermiEnergy`: the charge at every level and in every middle. */
export function prepareFermi(): void {
  nodeCount = 2 * count - 1;
  for (let j = 0; j < count; j++) {
    put(nodes, 2 * j, at(energies, j));
    if (j + 1 < count) put(nodes, 2 * j + 1, 0.5 * (at(energies, j) + at(energies, j + 1)));
  }
  for (let i = 0; i < nodeCount; i++) put(charges, i, chargeAt(at(nodes, i)));
}

/** Fermi energy at the charge `carrier` (1/nm²); NaN where it lies outside the listed levels. */
export function fermiEnergy(carrier: f64): f64 {
  if (broadening == NO_BROADENING && thermalEnergy == 0) return stepEnergy(carrier);
  const flat = 1e-13 * total * perLevel;
  if (!(carrier >= at(charges, 0) - flat && carrier <= at(charges, nodeCount - 1) + flat)) return NaN;
  let low = 0;
  let high = nodeCount - 1;
  while (high - low > 1) {
    const middle = (low + high) >> 1;
    if (at(charges, middle) <= carrier) low = middle;
    else high = middle;
  }
  // in a gap between narrow lines the charge is flat: its middle is the answer, not an end
  if (isMiddle(low) && Math.abs(at(charges, low) - carrier) <= flat) return at(nodes, low);
  if (isMiddle(high) && Math.abs(at(charges, high) - carrier) <= flat) return at(nodes, high);
  wanted = carrier;
  return bracketedRoot(excess, at(nodes, low), at(nodes, high), at(charges, low) - carrier, at(charges, high) - carrier, flat);
}

@inline
function isMiddle(node: i32): bool {
  return (node & 1) == 1;
}

/** Carrier density that `excess` is counted from. */
let wanted: f64 = 0;

function excess(energy: f64): f64 {
  return chargeAt(energy) - wanted;
}

/** Sharp levels at zero temperature: the level that is being filled, or the middle of a gap when one is full. */
function stepEnergy(carrier: f64): f64 {
  const target = carrier / perLevel + 0.5 * total;
  if (!(target >= 0 && target <= total)) return NaN;
  const close = 1e-12 * total;
  let filled = 0.0;
  for (let j = 0; j < count; j++) {
    filled += at(weights, j);
    if (Math.abs(target - filled) <= close && j + 1 < count) return 0.5 * (at(energies, j) + at(energies, j + 1));
    if (target < filled) return at(energies, j);
  }
  return at(energies, count - 1);
}
