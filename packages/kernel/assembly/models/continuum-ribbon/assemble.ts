/** Selects, reduces and copies what the slices left: arrays in the manifest's order, then the certificate. */
import { mark, release } from "../../arena";
import { at, put } from "../../doubles";
import { fail } from "../../diagnostic";
import { progress } from "../../host";
import { addArray, addCertificateNumber, addCheck, beginResult, F64, finishResult, I32, U8 } from "../../result";
import { PAYLOAD_MISMATCH } from "../../status";
import { totalSlices } from "./blocks";
import { countChannels } from "./channels";
import { CHECK_COUNT, newChecks, noteCheck } from "./checks";
import { positionAt, positionCount } from "./expectation";
import { conductionEv, conductionK, findGap, gapAtEnd, gapErrorEv, gapEv, gapIsDirect, gapValid, valenceEv, valenceK } from "./gap";
import { Grid, makeGrid } from "./grid";
import { cells, energyAxis, gridCount, kAxis, spinCode, spinCount, stateCount, states, valleyCode, valleyCount, widthNm } from "./parameters";
import { checksOf, readPayloads, rowAt, totalLevels } from "./payloads";
import {
  densityOf, levelAt, LEVEL_CLUSTER, LEVEL_ENERGY, LEVEL_ERROR, LEVEL_ESTIMATE, LEVEL_INDEX, LEVEL_PROOF, LEVEL_SHARE,
  LEVEL_VELOCITY, ROW_CUT, ROW_FOUND, ROW_HIGH, ROW_LOW, ROW_RESIDUAL, ROW_WANTED, rowLevels,
} from "./row";

const ARRAYS: i32 = 30;

@inline
function putByte(p: usize, i: i32, value: i32): void {
  store<u8>(p + <usize>i, <u8>value);
}
@inline
function putInteger(p: usize, i: i32, value: i32): void {
  store<i32>(p + (<usize>i << 2), value);
}

export function assemble(): i32 {
  if (!readPayloads()) return fail(PAYLOAD_MISMATCH, "A payload has another length than its slice.");
  const worst = newChecks(); // before the result, whose bytes must be one piece
  beginResult(ARRAYS);
  writeAxes();
  writeLevels();
  progress(0.4, 1);
  writeGap();
  const channels = addArray(22, F64, 1, energyAxis.count);
  countChannels(channels, addArray(23, U8, 1, energyAxis.count));
  writeDensities();
  writeCertificate(worst);
  return finishResult();
}

function writeAxes(): void {
  const k = addArray(0, F64, 1, kAxis.count);
  memory.copy(k, kAxis.values, <usize>kAxis.count << 3);
  const valley = addArray(1, I32, 1, valleyCount);
  for (let v = 0; v < valleyCount; v++) putInteger(valley, v, valleyCode(v));
  put(addArray(2, F64, 0, 1), 0, widthNm);
  const energy = addArray(3, F64, 1, energyAxis.count);
  memory.copy(energy, energyAxis.values, <usize>energyAxis.count << 3);
}

// the spins of one valley and wave number, merged by energy: which spin and which level comes next
let nextSpin: i32 = 0;
let nextLevel: i32 = 0;
let taken0: i32 = 0;
let taken1: i32 = 0;

function beginMerge(): void {
  taken0 = 0;
  taken1 = 0;
}

/** Advances to the next level of (v, k) in ascending energy; false at the end. */
function mergeNext(v: i32, k: i32): bool {
  const row0 = rowAt(v * spinCount, k);
  const has0 = taken0 < rowLevels(row0);
  let has1 = false;
  let first = has0;
  if (spinCount == 2) {
    const row1 = rowAt(v * spinCount + 1, k);
    has1 = taken1 < rowLevels(row1);
    if (has0 && has1) first = at(levelAt(row0, taken0), LEVEL_ENERGY) <= at(levelAt(row1, taken1), LEVEL_ENERGY);
  }
  if (!has0 && !has1) return false;
  nextSpin = first ? 0 : 1;
  nextLevel = first ? taken0++ : taken1++;
  return true;
}

function writeLevels(): void {
  const rows = valleyCount * kAxis.count;
  const offsets = addArray(4, I32, 1, rows + 1);
  const energies = addArray(5, F64, 1, totalLevels);
  const velocities = addArray(6, F64, 1, totalLevels);
  const errors = addArray(7, F64, 1, totalLevels);
  const errorsValid = addArray(8, U8, 1, totalLevels);
  const shares = addArray(9, F64, 1, totalLevels);
  const cluster = addArray(10, I32, 1, totalLevels);
  const index = addArray(11, I32, 1, totalLevels);
  const spin = addArray(12, I32, 1, totalLevels);
  const cut = addArray(13, U8, 2, valleyCount, kAxis.count);
  const proved = addArray(14, F64, 3, valleyCount, kAxis.count, 2);
  let to = 0;
  for (let row = 0; row < rows; row++) {
    const v = row / kAxis.count;
    const k = row % kAxis.count;
    // per spin: the cluster being written and where it began
    let open0 = -1, open1 = -1, start0 = 0, start1 = 0;
    beginMerge();
    for (; mergeNext(v, k); to++) {
      const level = levelAt(rowAt(v * spinCount + nextSpin, k), nextLevel);
      const own = <i32>at(level, LEVEL_CLUSTER);
      if (nextSpin == 0 && own != open0) { open0 = own; start0 = to; }
      if (nextSpin == 1 && own != open1) { open1 = own; start1 = to; }
      put(energies, to, at(level, LEVEL_ENERGY));
      put(velocities, to, at(level, LEVEL_VELOCITY));
      put(errors, to, at(level, LEVEL_ERROR));
      putByte(errorsValid, to, at(level, LEVEL_ESTIMATE) != 0 ? 1 : 0);
      put(shares, to, at(level, LEVEL_SHARE));
      putInteger(cluster, to, nextSpin == 0 ? start0 : start1);
      putInteger(index, to, <i32>at(level, LEVEL_INDEX));
      putInteger(spin, to, spinCode(nextSpin));
    }
    putInteger(offsets, row + 1, to);
    writeRange(row, v, k, cut, proved);
  }
}

/** Where the merged list is complete: the ranges of both spins overlap there. */
function writeRange(row: i32, v: i32, k: i32, cut: usize, proved: usize): void {
  let low = -Infinity, high = Infinity, incomplete = 0;
  for (let s = 0; s < spinCount; s++) {
    const from = rowAt(v * spinCount + s, k);
    low = Math.max(low, at(from, ROW_LOW));
    high = Math.min(high, at(from, ROW_HIGH));
    incomplete = max(incomplete, <i32>at(from, ROW_CUT));
  }
  putByte(cut, row, incomplete);
  put(proved, 2 * row, low);
  put(proved, 2 * row + 1, high);
}

function writeGap(): void {
  findGap();
  put(addArray(15, F64, 0, 1), 0, gapValid ? gapEv : 0);
  put(addArray(16, F64, 0, 1), 0, gapValid ? gapErrorEv : 0);
  const k = addArray(17, F64, 1, 2);
  const edges = addArray(18, F64, 1, 2);
  if (gapValid) {
    put(k, 0, valenceK);
    put(k, 1, conductionK);
    put(edges, 0, valenceEv);
    put(edges, 1, conductionEv);
  }
  putByte(addArray(19, U8, 0, 1), 0, gapValid && gapIsDirect ? 1 : 0);
  putByte(addArray(20, U8, 0, 1), 0, gapValid ? 1 : 0);
  putByte(addArray(21, U8, 0, 1), 0, gapValid && gapAtEnd ? 1 : 0);
}

/** Densities at the asked wave numbers: rows in the order valley, state, level. */
function writeDensities(): void {
  const room = mark();
  const grid: Grid = makeGrid(cells << (gridCount - 1), 1, 0);
  const points = stateCount > 0 ? positionCount(grid) : 0;
  const offset = positionAt(grid, 0);
  const step = 0.5 * grid.h;
  release(room);
  let rows = 0;
  for (let s = 0; s < valleyCount * spinCount; s++) {
    for (let i = 0; i < stateCount; i++) rows += rowLevels(rowAt(s, <i32>at(states, i)));
  }
  const offsets = addArray(24, I32, 1, valleyCount * stateCount + 1);
  const position = addArray(25, F64, 1, points);
  for (let i = 0; i < points; i++) put(position, i, offset + <f64>i * step);
  const a = addArray(26, F64, 2, rows, points);
  const b = addArray(27, F64, 2, rows, points);
  const kIndex = addArray(28, I32, 1, rows);
  const energy = addArray(29, F64, 1, rows);
  const bytes = <usize>points << 3;
  let to = 0;
  for (let v = 0; v < valleyCount; v++) {
    for (let i = 0; i < stateCount; i++) {
      const k = <i32>at(states, i);
      beginMerge();
      for (; mergeNext(v, k); to++) {
        const row = rowAt(v * spinCount + nextSpin, k);
        const density = densityOf(row, nextLevel);
        memory.copy(a + <usize>to * bytes, density, bytes);
        memory.copy(b + <usize>to * bytes, density + bytes, bytes);
        putInteger(kIndex, to, k);
        put(energy, to, at(levelAt(row, nextLevel), LEVEL_ENERGY));
      }
      putInteger(offsets, v * stateCount + i + 1, to);
    }
  }
}

function writeCertificate(worst: usize): void {
  let residual: f64 = 0, proof: f64 = 0, wanted: f64 = 0, found: f64 = 0, error: f64 = 0, left: f64 = 0, cut: f64 = 0;
  for (let s = 0; s < valleyCount * spinCount; s++) {
    for (let k = 0; k < kAxis.count; k++) {
      const row = rowAt(s, k);
      residual = Math.max(residual, at(row, ROW_RESIDUAL));
      wanted += at(row, ROW_WANTED);
      found += at(row, ROW_FOUND);
      cut += at(row, ROW_CUT);
      for (let i = 0, n = rowLevels(row); i < n; i++) {
        const level = levelAt(row, i);
        error = Math.max(error, at(level, LEVEL_ERROR));
        proof = Math.max(proof, at(level, LEVEL_PROOF));
        if (at(level, LEVEL_ESTIMATE) == 2) left++;
      }
    }
  }
  addCertificateNumber(residual);
  addCertificateNumber(proof);
  addCertificateNumber(wanted);
  addCertificateNumber(found);
  addCertificateNumber(error);
  addCertificateNumber(left);
  addCertificateNumber(cut);
  for (let slice = 0, n = totalSlices(); slice < n; slice++) {
    const checks = checksOf(slice);
    for (let code = 0; code < CHECK_COUNT; code++) {
      const check = checks + <usize>code * 32;
      if (at(check, 0) != 0) noteCheck(worst, code, at(check, 1), at(check, 2), at(check, 3));
    }
  }
  for (let code = 0; code < CHECK_COUNT; code++) {
    const check = worst + <usize>code * 32;
    if (at(check, 0) != 0) addCheck(code, at(check, 1), at(check, 2), at(check, 3));
  }
}
