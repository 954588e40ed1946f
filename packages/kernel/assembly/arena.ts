/**
 * The one allocator of the kernel: a bump pointer over linear memory, released by marks. Loops allocate nothing;
 * a slice reserves what it needs and the next slice takes the same addresses again.
 *
 * Contents of reserved memory are undefined (left over from earlier slices): write before reading, or use
 * `reserveZeroed`. All sums are made in u64, so that nothing wraps at 4 GiB.
 */
import { abandon } from "./host";
import { MACHINE_OUT_OF_MEMORY, MEMORY_EXCEEDED } from "./status";

/** Cache line, and more than any SIMD alignment. */
const ALIGNMENT: u64 = 64;
/** 4 GiB minus one page: keeps every end address inside a u32. */
const LIMIT: u64 = 0xffff0000;

let top: u64 = align(<u64>__heap_base);

@inline
function align(address: u64): u64 {
  return (address + (ALIGNMENT - 1)) & ~(ALIGNMENT - 1);
}

/** Reserves `bytes`, 64-byte aligned. Leaves the kernel when the module or the machine has no more memory. */
export function reserve(bytes: u64): usize {
  const at = align(top);
  const end = at + bytes;
  if (bytes > LIMIT || end > LIMIT) abandon(MEMORY_EXCEEDED);
  const pages = (end + 0xffff) >> 16;
  const have = <u64>(<u32>memory.size());
  if (pages > have && memory.grow(<i32>(pages - have)) < 0) abandon(MACHINE_OUT_OF_MEMORY);
  top = end;
  return <usize>at;
}

export function reserveZeroed(bytes: u64): usize {
  const at = reserve(bytes);
  memory.fill(at, 0, <usize>bytes);
  return at;
}

/** `count` doubles, contents undefined. */
export function reserveF64(count: u64): usize {
  return reserve(count << 3);
}

/** The present top; hand it to `release` to give back everything reserved since. */
export function mark(): usize {
  return <usize>top;
}

export function release(to: usize): void {
  top = <u64>to;
}

/** Gives everything back: the state before the first record. */
export function releaseAll(): void {
  top = align(<u64>__heap_base);
}

/** Whether `bytes` more could be reserved inside the module's limit; depends on the record alone, not on the machine. */
export function fits(bytes: u64): bool {
  return bytes <= LIMIT && align(top) + bytes <= LIMIT;
}
