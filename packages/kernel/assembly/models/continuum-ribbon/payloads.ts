/**
 * Reads the payloads of slice.ts for `assemble`: addresses of all rows, and of what follows them, checked for length.
 */
import { reserve } from "../../arena";
import { at } from "../../doubles";
import { payloadAddress, payloadBytes } from "../../payload";
import { blockCount, blockEnd, blockStart, totalSlices } from "./blocks";
import { CHECK_DOUBLES } from "./checks";
import { EXTREMUM_DOUBLES } from "./extrema";
import { kAxis } from "./parameters";
import { rowDoubles, rowLevels } from "./row";

/** u32 address per (valley, spin, k). */
let rows: usize = 0;
/** u32 addresses per slice: extrema (count first), outside counts (count first), checks. */
let tails: usize = 0;
export let totalLevels: i32 = 0;

export function rowAt(series: i32, k: i32): usize {
  return load<u32>(rows + (<usize>(series * kAxis.count + k) << 2));
}
function tail(slice: i32, part: i32): usize {
  return load<u32>(tails + (<usize>(3 * slice + part) << 2));
}
export function extremaOf(slice: i32): i32 {
  return <i32>at(tail(slice, 0), 0);
}
export function extremumAt(slice: i32, i: i32): usize {
  return tail(slice, 0) + 8 + (<usize>(i * EXTREMUM_DOUBLES) << 3);
}
export function outsideCounts(slice: i32): i32 {
  return <i32>at(tail(slice, 1), 0);
}
export function outsideAt(slice: i32): usize {
  return tail(slice, 1) + 8;
}
export function checksOf(slice: i32): usize {
  return tail(slice, 2);
}

/** False when a payload is not as long as what it says it holds. */
export function readPayloads(): bool {
  const slices = totalSlices();
  const blocks = blockCount();
  rows = reserve(<u64>(slices / blocks) * <u64>kAxis.count * 4);
  tails = reserve(<u64>slices * 12);
  totalLevels = 0;
  for (let slice = 0; slice < slices; slice++) {
    const block = slice % blocks;
    const series = slice / blocks;
    let cursor = payloadAddress(slice);
    const end = cursor + payloadBytes(slice);
    for (let k = blockStart(block); k < blockEnd(block); k++) {
      if (cursor + 72 > end) return false;
      store<u32>(rows + (<usize>(series * kAxis.count + k) << 2), <u32>cursor);
      totalLevels += rowLevels(cursor);
      cursor += <usize>rowDoubles(cursor) << 3;
    }
    if (cursor + 8 > end) return false;
    store<u32>(tails + (<usize>(3 * slice) << 2), <u32>cursor);
    cursor += (1 + <usize>at(cursor, 0) * EXTREMUM_DOUBLES) << 3;
    if (cursor + 8 > end) return false;
    store<u32>(tails + (<usize>(3 * slice + 1) << 2), <u32>cursor);
    cursor += (1 + <usize>at(cursor, 0)) << 3;
    store<u32>(tails + (<usize>(3 * slice + 2) << 2), <u32>cursor);
    if (cursor + (<usize>CHECK_DOUBLES << 3) != end) return false;
  }
  return true;
}
