/**
 * One field's share of the result: a row of doubles, sections one after the other. Slices write rows as payload,
 * `assemble` copies their sections into the arrays.
 */
import { at, put } from "../../doubles";
import { mark, release, reserveF64 } from "../../arena";
import { FLUX_QUANTUM, HBAR_OVER_E } from "../../constants";
import { fieldLevels } from "./field-levels";
import { chargeAt, densityAt, fermiEnergy, plateauAt, prepareFermi, setLevels } from "./occupation";
import { broadening, carrier, energy, levelCount, NO_BROADENING, spinCount, spinEnergy, valleyCount, valleySign } from "./parameters";
import { positionOf, transitionCount, transitionFrom, transitionTo } from "./transitions";

/** Offsets of the sections, in doubles. */
export let energiesOffset: i32 = 0;
export let errorsOffset: i32 = 0;
export let validOffset: i32 = 0;
export let densityOffset: i32 = 0;
export let chargeOffset: i32 = 0;
export let plateauOffset: i32 = 0;
export let fermiOffset: i32 = 0;
export let fermiValidOffset: i32 = 0;
export let fillingOffset: i32 = 0;
export let transitionOffset: i32 = 0;
export let transitionValidOffset: i32 = 0;
/** Magnetic length, degeneracy, and whether every level of the field is valid. */
export let lengthOffset: i32 = 0;
export let degeneracyOffset: i32 = 0;
export let wholeOffset: i32 = 0;
export let rowLength: i32 = 0;

export function layOutRow(): void {
  const perValley = levelCount();
  energiesOffset = 0;
  errorsOffset = energiesOffset + valleyCount * spinCount * perValley;
  validOffset = errorsOffset + valleyCount * perValley;
  densityOffset = validOffset + valleyCount * perValley;
  chargeOffset = densityOffset + (broadening == NO_BROADENING ? 0 : energy.count);
  plateauOffset = chargeOffset + energy.count;
  fermiOffset = plateauOffset + energy.count;
  fermiValidOffset = fermiOffset + carrier.count;
  fillingOffset = fermiValidOffset + carrier.count;
  transitionOffset = fillingOffset + carrier.count;
  transitionValidOffset = transitionOffset + valleyCount * transitionCount();
  lengthOffset = transitionValidOffset + valleyCount * transitionCount();
  degeneracyOffset = lengthOffset + 1;
  wholeOffset = degeneracyOffset + 1;
  rowLength = wholeOffset + 1;
}

/** Address of a section. */
@inline
export function section(row: usize, offset: i32): usize {
  return row + (<usize>offset << 3);
}

/** Fills the row of the field b (T); every double of it is written. */
export function fillRow(row: usize, b: f64): void {
  memory.fill(row, 0, <usize>rowLength << 3);
  const whole = fillLevels(row, b);
  put(row, degeneracyOffset, Math.abs(b) / FLUX_QUANTUM);
  put(row, wholeOffset, whole ? 1 : 0);
  if (b != 0) {
    put(row, lengthOffset, Math.sqrt(HBAR_OVER_E / Math.abs(b)));
    for (let i = 0; i < carrier.count; i++) put(row, fillingOffset + i, (carrier.at(i) * FLUX_QUANTUM) / Math.abs(b));
  }
  fillTransitions(row);
  if (whole) fillOccupation(row, b);
}

/** Energies, errors, validity; answers whether every level is valid. */
function fillLevels(row: usize, b: f64): bool {
  const n = levelCount();
  let whole = true;
  for (let valley = 0; valley < valleyCount; valley++) {
    const values = section(row, energiesOffset + valley * spinCount * n);
    const valid = section(row, validOffset + valley * n);
    fieldLevels(b, valleySign(valley), values, section(row, errorsOffset + valley * n), valid);
    // the second spin first: the first one overwrites what both start from
    for (let spin = spinCount - 1; spin >= 0; spin--) {
      const shift = spinEnergy(spin, b);
      for (let i = 0; i < n; i++) put(values, spin * n + i, at(valid, i) != 0 ? at(values, i) + shift : 0);
    }
    for (let i = 0; i < n; i++) if (at(valid, i) == 0) whole = false;
  }
  return whole;
}

function fillTransitions(row: usize): void {
  const n = levelCount();
  const transitions = transitionCount();
  for (let valley = 0; valley < valleyCount; valley++) {
    // spin is conserved: its energy drops out
    const values = section(row, energiesOffset + valley * spinCount * n);
    const valid = section(row, validOffset + valley * n);
    for (let t = 0; t < transitions; t++) {
      const from = positionOf(transitionFrom(t));
      const to = positionOf(transitionTo(t));
      if (at(valid, from) == 0 || at(valid, to) == 0) continue;
      put(row, transitionOffset + valley * transitions + t, at(values, to) - at(values, from));
      put(row, transitionValidOffset + valley * transitions + t, 1);
    }
  }
}

/** Levels of a whole row into occupation.ts. */
export function takeLevels(row: usize, b: f64): void {
  const all = valleyCount * spinCount * levelCount();
  const copy = reserveF64(all);
  memory.copy(copy, section(row, energiesOffset), <usize>all << 3);
  setLevels(copy, all, b, reserveF64(6 * <u64>all + 2));
}

function fillOccupation(row: usize, b: f64): void {
  const room = mark();
  takeLevels(row, b);
  for (let i = 0; i < energy.count; i++) {
    const e = energy.at(i);
    if (broadening != NO_BROADENING) put(row, densityOffset + i, densityAt(e));
    put(row, chargeOffset + i, chargeAt(e));
    put(row, plateauOffset + i, plateauAt(e));
  }
  prepareFermi();
  for (let i = 0; i < carrier.count; i++) {
    const e = fermiEnergy(carrier.at(i));
    if (isNaN(e)) continue;
    put(row, fermiOffset + i, e);
    put(row, fermiValidOffset + i, 1);
  }
  release(room);
}
