/**
 * The result buffer, little-endian, 8-byte aligned:
 *
 *   magic u32 "NCS1", interface u32, array count u32, certificate length u32 (in doubles)
 *   per array: manifest index u32, dtype u32 (0 f64, 1 i32, 2 u8), rank u32, 0 u32, shape u32 × rank (padded to 8),
 *              byte offset f64 from the start of the buffer, byte length f64
 *   the arrays, then the certificate as the last doubles of the buffer: the model's numbers in the manifest's order,
 *   then per check its manifest index, computed, expected, tolerance, holds (0 or 1)
 *
 * Use: beginResult(n) · array pointer = addArray*(…) n times, filled by the model · addCertificateNumber(…) and
 * addCheck(…) · return finishResult(). −0 becomes 0; a NaN or infinity turns the result into status NOT_FINITE.
 */
import { mark, reserve, reserveF64, reserveZeroed } from "./arena";
import { diagnose, diagnoseInteger, fail } from "./diagnostic";
import { setOutput } from "./payload";
import { INTERFACE_VERSION } from "./record";
import { NOT_FINITE, OK } from "./status";

const MAGIC: u32 = 0x3153434e; // "NCS1"
export const F64: u32 = 0;
export const I32: u32 = 1;
export const U8: u32 = 2;

const MAX_RANK: usize = 8;
const ENTRY_BYTES: usize = 16 + 4 * MAX_RANK + 16;
const MAX_CERTIFICATE: u64 = 1024;

let start: usize = 0;
let entry: usize = 0;
let arrayCount: u32 = 0;
let certificate: usize = 0;
let certificateLength: u32 = 0;

/** Opens the buffer for at most `maxArrays` arrays. */
export function beginResult(maxArrays: i32): void {
  certificate = reserveF64(MAX_CERTIFICATE);
  certificateLength = 0;
  start = reserveZeroed(16 + <u64>maxArrays * ENTRY_BYTES);
  entry = start + 16;
  arrayCount = 0;
}

function elementBytes(dtype: u32): u64 {
  return dtype == F64 ? 8 : dtype == I32 ? 4 : 1;
}

/**
 * Adds an array of `rank` (1…5) with the given shape and answers the address of its zero-filled values.
 * `index` is the array's position in the manifest's results.
 */
export function addArray(index: i32, dtype: u32, rank: i32, n0: i32, n1: i32 = 1, n2: i32 = 1, n3: i32 = 1, n4: i32 = 1): usize {
  const bytes = <u64>n0 * <u64>n1 * <u64>n2 * <u64>n3 * <u64>n4 * elementBytes(dtype);
  const values = reserveZeroed((bytes + 7) & ~7);
  store<u32>(entry, index);
  store<u32>(entry, dtype, 4);
  store<u32>(entry, rank, 8);
  const shape = entry + 16;
  store<i32>(shape, n0);
  if (rank > 1) store<i32>(shape, n1, 4);
  if (rank > 2) store<i32>(shape, n2, 8);
  if (rank > 3) store<i32>(shape, n3, 12);
  if (rank > 4) store<i32>(shape, n4, 16);
  const tail = shape + ((<usize>rank * 4 + 7) & ~7);
  store<f64>(tail, <f64>(values - start));
  store<f64>(tail, <f64>bytes, 8);
  entry = tail + 16;
  arrayCount++;
  return values;
}

/** Numbers of the manifest's `certificate`, one call each, in its order, before the first check. */
export function addCertificateNumber(value: f64): void {
  store<f64>(certificate + (<usize>certificateLength << 3), value);
  certificateLength++;
}

/** One check that applies: its position in the manifest's checks, and |computed − expected| ≤ tolerance decides. */
export function addCheck(index: i32, computed: f64, expected: f64, tolerance: f64): void {
  addCertificateNumber(<f64>index);
  addCertificateNumber(computed);
  addCertificateNumber(expected);
  addCertificateNumber(tolerance);
  addCertificateNumber(Math.abs(computed - expected) <= tolerance ? 1 : 0);
}

/** Replaces −0 by 0; false at the first NaN or infinity. */
function normalise(values: usize, count: u64): bool {
  for (let p = values, stop = values + <usize>(count << 3); p < stop; p += 8) {
    const value = load<f64>(p);
    if (!isFinite(value)) return false;
    if (value == 0) store<f64>(p, 0);
  }
  return true;
}

/** Closes the buffer: guards every double, copies the certificate to the end, and hands the buffer to the host. */
export function finishResult(): i32 {
  let at = start + 16;
  for (let i: u32 = 0; i < arrayCount; i++) {
    const rank = <usize>load<u32>(at, 8);
    const tail = at + 16 + ((rank * 4 + 7) & ~7);
    if (load<u32>(at, 4) == F64) {
      if (!normalise(start + <usize>load<f64>(tail), <u64>load<f64>(tail, 8) >> 3)) {
        fail(NOT_FINITE, "A value of the result is not finite, in array ");
        diagnoseInteger(load<u32>(at));
        diagnose(".");
        return NOT_FINITE;
      }
    }
    at = tail + 16;
  }
  if (!normalise(certificate, certificateLength)) return fail(NOT_FINITE, "A value of the certificate is not finite.");
  const bytes = <usize>certificateLength << 3;
  memory.copy(reserve(bytes), certificate, bytes);
  store<u32>(start, MAGIC);
  store<u32>(start, INTERFACE_VERSION, 4);
  store<u32>(start, arrayCount, 8);
  store<u32>(start, certificateLength, 12);
  setOutput(start, mark() - start);
  return OK;
}
