/**
 * Reads a record: the specification, depth-first in the manifest's order, as a stream of doubles behind a header.
 *
 *   header   magic u32 "NCR1", interface u32, model index u32, 0 u32
 *   number, integer  f64 · boolean 0/1 · enum index · choice = kind index, then the members of that kind
 *   axis = kind index (0 bare number, 1 range, 2 values, 3 whole zone), then its members
 *   auto-number = 0, or 1 and the number · group = its members · list = count, then items
 *   table = column count, row count, then the columns one after the other
 *
 * The cursor never passes the end: a short record or a non-finite number marks the record as broken and reads as 0;
 * a model reads everything, then asks `recordStatus()` once.
 */
import { INVALID_RECORD, OK } from "./status";
import { fail } from "./diagnostic";

export const MAGIC: u32 = 0x3152434e; // "NCR1", little-endian
export const INTERFACE_VERSION: u32 = 1;
const HEADER_BYTES: usize = 16;

let cursor: usize = 0;
let end: usize = 0;
let broken: bool = false;

/** Model index of the record, or −1 when the header is not one of this interface. */
export function openRecord(pointer: usize, length: usize): i32 {
  cursor = pointer + HEADER_BYTES;
  end = pointer + length;
  broken = false;
  if (length < HEADER_BYTES || (length & 7) != 0) return -1;
  if (load<u32>(pointer) != MAGIC || load<u32>(pointer, 4) != INTERFACE_VERSION) return -1;
  return load<i32>(pointer, 8);
}

export function readNumber(): f64 {
  if (cursor + 8 > end) {
    broken = true;
    return 0;
  }
  const value = load<f64>(cursor);
  cursor += 8;
  if (!isFinite(value)) {
    broken = true;
    return 0;
  }
  return value;
}

/** Integer, enum index, kind index or count; a value that is no integer of i32 marks the record as broken. */
export function readInteger(): i32 {
  const value = readNumber();
  const integer = <i32>value;
  if (<f64>integer != value) broken = true;
  return integer;
}

export function readBoolean(): bool {
  return readInteger() != 0;
}

/** `count` doubles in place: the address of the first, or 0 when the record is too short. */
export function readBlock(count: i32): usize {
  const bytes = <u64>count << 3;
  if (count < 0 || <u64>cursor + bytes > <u64>end) {
    broken = true;
    return 0;
  }
  const at = cursor;
  cursor += <usize>bytes;
  for (let p = at; p < cursor; p += 8) {
    if (!isFinite(load<f64>(p))) broken = true;
  }
  return at;
}

/** Marks the record as broken: what was read is nothing that the host writes. */
export function breakRecord(): void {
  broken = true;
}

export function isBroken(): bool {
  return broken;
}

/** After everything was read: OK only when the record was whole and nothing is left over. */
export function recordStatus(): i32 {
  if (broken) return fail(INVALID_RECORD, "The record ends too early or holds a number that its field cannot be.");
  if (cursor != end) return fail(INVALID_RECORD, "The record is longer than the model's fields.");
  return OK;
}
