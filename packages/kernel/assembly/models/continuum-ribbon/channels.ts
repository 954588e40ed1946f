/**
 * Right-moving modes at every energy of the axis: how often a subband crosses it upwards as k grows.
 *
 * Each band (signed index) is a chain of monotone pieces between sampled points and refined extrema; a band that leaves
 * the list goes beyond its proved ends. At T = 0 a rising run from E_a to E_b counts one for E_a < E ≤ E_b; at T > 0 it
 * counts f(E_a) − f(E_b), the thermal mean ∫(−∂f/∂ε) over the run.
 *
 * channelsValid is 1 where E (± 20 k_B T) lies inside the proved range at every k, no piece could hide a pair of
 * crossings at E, and no level crosses E beyond either end.
 *
 * Source    Landauer counting (common practice); R. Landauer, IBM J. Res. Dev. 1, 223 (1957) (from memory); monotone
 *           cubic criterion: F. N. Fritsch, R. E. Carlson, SIAM J. Numer. Anal. 17, 238 (1980) (from memory).
 */
import { BOLTZMANN } from "../../constants";
import { at, put } from "../../doubles";
import { progress } from "../../host";
import { blockCount, blockEnd, blockStart } from "./blocks";
import { extremaOf, extremumAt, outsideAt, rowAt } from "./payloads";
import { energyAxis, kAxis, kIncreases, spinCount, spinFactor, temperatureK, valleyCount, velocity } from "./parameters";
import {
  leftVelocity, levelAt, LEVEL_ENERGY, LEVEL_ERROR, LEVEL_INDEX, positionOf, rightVelocity, ROW_HIGH, ROW_LOW, rowLevels,
} from "./row";

let channels: usize = 0;
let valid: usize = 0;

@inline
function invalidate(i: i32): void {
  store<u8>(valid + <usize>i, 0);
}

/** Occupation at x = (ε − E)/kT without overflow. */
function fermi(x: f64): f64 {
  return x > 40 ? Math.exp(-x) : x < -40 ? 1 : 1 / (1 + Math.exp(x));
}

/** A rising run of one band from a to b; ±Infinity for an end beyond the list. */
function addRun(a: f64, b: f64): void {
  const n = energyAxis.count;
  if (temperatureK == 0) {
    for (let i = 0; i < n; i++) if (a < energyAxis.at(i) && energyAxis.at(i) <= b) put(channels, i, at(channels, i) + spinFactor);
    return;
  }
  const beta = 1 / (BOLTZMANN * temperatureK);
  for (let i = 0; i < n; i++) {
    const e = energyAxis.at(i);
    const low = a == -Infinity ? 1 : fermi((a - e) * beta);
    const high = b == Infinity ? 0 : fermi((b - e) * beta);
    put(channels, i, at(channels, i) + spinFactor * (low - high));
  }
}

/** Marks every energy between a and b, widened by `reach`. */
function doubt(a: f64, b: f64, reach: f64): void {
  const low = Math.min(a, b) - reach;
  const high = Math.max(a, b) + reach;
  for (let i = 0, n = energyAxis.count; i < n; i++) {
    if (energyAxis.at(i) >= low && energyAxis.at(i) <= high) invalidate(i);
  }
}

/**
 * Whether a piece between two points of one band could turn round unseen: slopes of one sign that a monotone cubic
 * cannot join. Where it could, energies within ħvΔk/2 of the piece (the steepest way there and back) are in doubt.
 */
function judge(ka: f64, ea: f64, va: f64, kb: f64, eb: f64, vb: f64, error: f64): void {
  const secant = (eb - ea) / (kb - ka);
  const noise = 2 * error / (kb - ka) + 1e-9 * velocity;
  if (Math.abs(secant) <= noise && Math.abs(va) <= 2 * noise && Math.abs(vb) <= 2 * noise) return doubt(ea, eb, error);
  const x = va / secant;
  const y = vb / secant;
  const room = noise / Math.abs(secant);
  if (x >= -room && y >= -room && x * x + y * y <= 9) return;
  doubt(ea, eb, 0.5 * velocity * (kb - ka));
}

// the band being followed
let runStart: f64 = 0;
let runEnd: f64 = 0;
let rising: i32 = 0;

function closeRun(): void {
  if (rising > 0) addRun(runStart, runEnd);
  rising = 0;
}

/** Continues the band to energy b; −Infinity or Infinity when it leaves the list. */
function moveTo(a: f64, b: f64): void {
  if (b > a) {
    if (rising <= 0) {
      closeRun();
      runStart = a;
    }
    rising = 1;
    runEnd = b;
  } else if (b < a) {
    closeRun();
    rising = -1;
  }
}

function followBand(series: i32, index: i32): void {
  rising = 0;
  const blocks = blockCount();
  for (let block = 0; block < blocks; block++) {
    const slice = series * blocks + block;
    for (let k = blockStart(block); k < blockEnd(block) && k + 1 < kAxis.count; k++) {
      const left = rowAt(series, k);
      const right = rowAt(series, k + 1);
      const i = positionOf(left, index);
      const j = positionOf(right, index);
      if (i < 0 && j < 0) {
        closeRun();
        continue;
      }
      const ea = i < 0 ? beyond(left, index) : at(levelAt(left, i), LEVEL_ENERGY);
      const eb = j < 0 ? beyond(right, index) : at(levelAt(right, j), LEVEL_ENERGY);
      if (i < 0 || j < 0) {
        moveTo(ea, eb);
        continue;
      }
      const ka = kAxis.at(k);
      const kb = kAxis.at(k + 1);
      const error = Math.max(at(levelAt(left, i), LEVEL_ERROR), at(levelAt(right, j), LEVEL_ERROR));
      const extremum = extremumBetween(slice, index, ka, kb);
      if (extremum == 0) {
        judge(ka, ea, rightVelocity(left, i), kb, eb, leftVelocity(right, j), error);
        moveTo(ea, eb);
      } else {
        const e = at(extremum, 2);
        moveTo(ea, e);
        moveTo(e, eb);
        doubt(e, e, at(extremum, 3));
      }
    }
  }
  closeRun();
}

/** Where a band lies that the list at this k does not hold. */
function beyond(row: usize, index: i32): f64 {
  const n = rowLevels(row);
  if (n == 0) return index >= 0 ? Infinity : -Infinity;
  return index > <i32>at(levelAt(row, n - 1), LEVEL_INDEX) ? Infinity : -Infinity;
}

function extremumBetween(slice: i32, index: i32, ka: f64, kb: f64): usize {
  for (let i = 0, n = extremaOf(slice); i < n; i++) {
    const extremum = extremumAt(slice, i);
    if (<i32>at(extremum, 0) == index && at(extremum, 1) >= ka && at(extremum, 1) <= kb) return extremum;
  }
  return 0;
}

/** Energies outside the proved range of any k are not valid. */
function judgeRanges(): void {
  const reach = 20 * BOLTZMANN * temperatureK;
  for (let series = 0; series < valleyCount * spinCount; series++) {
    for (let k = 0; k < kAxis.count; k++) {
      const row = rowAt(series, k);
      for (let i = 0, n = energyAxis.count; i < n; i++) {
        const e = energyAxis.at(i);
        if (e - reach <= at(row, ROW_LOW) || e + reach >= at(row, ROW_HIGH)) invalidate(i);
      }
    }
  }
}

/**
 * Beyond either end: every band there must move away from E, and half an axis further out as many levels must lie below
 * E as at the end.
 */
function judgeEnds(series: i32): void {
  const blocks = blockCount();
  for (let side = -1; side <= 1; side += 2) {
    const row = rowAt(series, side < 0 ? 0 : kAxis.count - 1);
    const slice = series * blocks + (side < 0 ? 0 : blocks - 1);
    const n = energyAxis.count;
    // a job of one block holds the counts of both ends, left first
    const outside = outsideAt(slice) + (side > 0 && blocks == 1 ? <usize>n << 3 : 0);
    const levels = rowLevels(row);
    for (let i = 0; i < n; i++) {
      const e = energyAxis.at(i);
      let below = levels > 0 ? <i32>at(levelAt(row, 0), LEVEL_INDEX) : 0;
      for (let l = 0; l < levels; l++) {
        const level = levelAt(row, l);
        const under = at(level, LEVEL_ENERGY) < e;
        if (under) below = <i32>at(level, LEVEL_INDEX) + 1;
        const outward = <f64>side * (side < 0 ? leftVelocity(row, l) : rightVelocity(row, l));
        const away = under ? -outward : outward;
        // a flat band stays where it is
        if (away < -1e-6 * velocity && Math.abs(at(level, LEVEL_ENERGY) - e) < velocity * Math.abs(kAxis.at(kAxis.count - 1) - kAxis.at(0))) invalidate(i);
      }
      if (<i32>at(outside, i) != below) invalidate(i);
    }
  }
}

/** Fills channels (f64) and channelsValid (u8). */
export function countChannels(channelsTo: usize, validTo: usize): void {
  channels = channelsTo;
  valid = validTo;
  for (let i = 0, n = energyAxis.count; i < n; i++) store<u8>(valid + <usize>i, kIncreases() ? 1 : 0);
  if (!kIncreases()) return;
  const all = valleyCount * spinCount;
  for (let series = 0; series < all; series++) {
    progress(0.5 + (0.5 * <f64>series) / <f64>all, 1);
    let low = i32.MAX_VALUE;
    let high = i32.MIN_VALUE;
    for (let k = 0; k < kAxis.count; k++) {
      const row = rowAt(series, k);
      const n = rowLevels(row);
      if (n == 0) continue;
      low = min(low, <i32>at(levelAt(row, 0), LEVEL_INDEX));
      high = max(high, <i32>at(levelAt(row, n - 1), LEVEL_INDEX));
    }
    for (let index = low; index <= high && low != i32.MAX_VALUE; index++) followBand(series, index);
    judgeEnds(series);
  }
  judgeRanges();
  for (let i = 0, n = energyAxis.count; i < n; i++) if (load<u8>(valid + <usize>i) == 0) put(channels, i, 0);
}
