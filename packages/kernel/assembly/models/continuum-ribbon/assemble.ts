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

const ARRAYS: i32 = 29;

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
  const spin = addArray(2, I32, 1, spinCount);
  for (let s = 0; s < spinCount; s++) putInteger(spin, s, spinCode(s));
  put(addArray(3, F64, 1, 1), 0, widthNm);
  const energy = addArray(4, F64, 1, energyAxis.count);
  memory.copy(energy, energyAxis.values, <usize>energyAxis.count << 3);
}

function writeLevels(): void {
  const rows = valleyCount * spinCount * kAxis.count;
  const offsets = addArray(5, I32, 1, rows + 1);
  const energies = addArray(6, F64, 1, totalLevels);
  const velocities = addArray(7, F64, 1, totalLevels);
  const errors = addArray(8, F64, 1, totalLevels);
  const errorsValid = addArray(9, U8, 1, totalLevels);
  const shares = addArray(10, F64, 1, totalLevels);
  const cluster = addArray(11, I32, 1, totalLevels);
  const index = addArray(12, I32, 1, totalLevels);
  const cut = addArray(13, U8, 3, valleyCount, spinCount, kAxis.count);
  const proved = addArray(14, F64, 4, valleyCount, spinCount, kAxis.count, 2);
  let to = 0;
  for (let row = 0; row < rows; row++) {
    const from = rowAt(row / kAxis.count, row % kAxis.count);
    const first = to;
    for (let i = 0, n = rowLevels(from); i < n; i++, to++) {
      const level = levelAt(from, i);
      put(energies, to, at(level, LEVEL_ENERGY));
      put(velocities, to, at(level, LEVEL_VELOCITY));
      put(errors, to, at(level, LEVEL_ERROR));
      putByte(errorsValid, to, at(level, LEVEL_ESTIMATE) != 0 ? 1 : 0);
      put(shares, to, at(level, LEVEL_SHARE));
      putInteger(cluster, to, first + <i32>at(level, LEVEL_CLUSTER));
      putInteger(index, to, <i32>at(level, LEVEL_INDEX));
    }
    putInteger(offsets, row + 1, to);
    putByte(cut, row, <i32>at(from, ROW_CUT));
    put(proved, 2 * row, at(from, ROW_LOW));
    put(proved, 2 * row + 1, at(from, ROW_HIGH));
  }
}

function writeGap(): void {
  findGap();
  put(addArray(15, F64, 1, 1), 0, gapValid ? gapEv : 0);
  put(addArray(16, F64, 1, 1), 0, gapValid ? gapErrorEv : 0);
  const k = addArray(17, F64, 1, 2);
  const edges = addArray(18, F64, 1, 2);
  if (gapValid) {
    put(k, 0, valenceK);
    put(k, 1, conductionK);
    put(edges, 0, valenceEv);
    put(edges, 1, conductionEv);
  }
  putByte(addArray(19, U8, 1, 1), 0, gapValid && gapIsDirect ? 1 : 0);
  putByte(addArray(20, U8, 1, 1), 0, gapValid ? 1 : 0);
  putByte(addArray(21, U8, 1, 1), 0, gapValid && gapAtEnd ? 1 : 0);
}

/** Densities at the asked wave numbers: rows in the order valley, spin, state, level. */
function writeDensities(): void {
  const room = mark();
  const grid: Grid = makeGrid(cells << (gridCount - 1), 1, 0);
  const points = stateCount > 0 ? positionCount(grid) : 0;
  const series = valleyCount * spinCount;
  let rows = 0;
  for (let s = 0; s < series; s++) for (let i = 0; i < stateCount; i++) rows += rowLevels(rowAt(s, <i32>at(states, i)));
  const offset = positionAt(grid, 0);
  const step = 0.5 * grid.h;
  release(room);
  const offsets = addArray(24, I32, 1, series * stateCount + 1);
  const position = addArray(25, F64, 1, points);
  for (let i = 0; i < points; i++) put(position, i, offset + <f64>i * step);
  const a = addArray(26, F64, 2, rows, points);
  const b = addArray(27, F64, 2, rows, points);
  const bytes = <usize>points << 3;
  let to = 0;
  for (let s = 0; s < series; s++) {
    for (let i = 0; i < stateCount; i++) {
      const row = rowAt(s, <i32>at(states, i));
      for (let l = 0, n = rowLevels(row); l < n; l++, to++) {
        const density = densityOf(row, l);
        memory.copy(a + <usize>to * bytes, density, bytes);
        memory.copy(b + <usize>to * bytes, density + bytes, bytes);
      }
      putInteger(offsets, s * stateCount + i + 1, to);
    }
  }
  const k = addArray(28, I32, 1, stateCount);
  for (let i = 0; i < stateCount; i++) putInteger(k, i, <i32>at(states, i));
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
