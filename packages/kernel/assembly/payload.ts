/**
 * Payloads: what a slice leaves and `assemble` takes. Their inside belongs to the model; the host only moves bytes.
 *
 *   input of assemble   count u32, 0 u32, then per payload (offset f64, length f64), then the payloads, 8-byte aligned
 */
import { reserve } from "./arena";

let outputPointer: usize = 0;
let outputLength: usize = 0;
let inputPointer: usize = 0;
let inputCount: i32 = 0;

/** Reserves the payload of the running slice. Call it once; every byte of it must be written. */
export function reservePayload(bytes: u64): usize {
  outputPointer = reserve(bytes);
  outputLength = <usize>bytes;
  return outputPointer;
}

/** Shortens the payload to the bytes that were used. */
export function truncatePayload(bytes: usize): void {
  outputLength = bytes;
}

/** Where the host finds what the last call left: a payload or a result. */
export function setOutput(pointer: usize, length: usize): void {
  outputPointer = pointer;
  outputLength = length;
}
export function outputAddress(): usize {
  return outputPointer;
}
export function outputBytes(): usize {
  return outputLength;
}

/** False when the bytes are no list of `expected` payloads inside `length`. */
export function openPayloads(pointer: usize, length: usize, expected: i32): bool {
  inputPointer = pointer;
  inputCount = 0;
  if (length < 8 || load<i32>(pointer) != expected) return false;
  const tableEnd = 8.0 + 16.0 * <f64>expected;
  if (<f64>length < tableEnd) return false;
  for (let i = 0; i < expected; i++) {
    const entry = pointer + 8 + (<usize>i << 4);
    const offset = load<f64>(entry);
    const bytes = load<f64>(entry, 8);
    if (!(offset >= tableEnd && bytes >= 0 && offset + bytes <= <f64>length)) return false;
    if ((<u32>offset & 7) != 0) return false;
  }
  inputCount = expected;
  return true;
}

export function payloadCount(): i32 {
  return inputCount;
}
/** Address of payload i, 8-byte aligned. */
export function payloadAddress(i: i32): usize {
  return inputPointer + <usize>load<f64>(inputPointer + 8 + (<usize>i << 4));
}
export function payloadBytes(i: i32): usize {
  return <usize>load<f64>(inputPointer + 8 + (<usize>i << 4), 8);
}
