/**
 * The sentence that goes with a status: UTF-8 in a fixed buffer. Built by `diagnose(...)` calls, one piece after the
 * other; text past the buffer is cut. Only for people: no digest contains it.
 */
const CAPACITY: usize = 1024;
const buffer: usize = memory.data(1024, 8);
let length: usize = 0;

export function clearDiagnostic(): void {
  length = 0;
}

export function diagnosticAddress(): usize {
  return buffer;
}

export function diagnosticLength(): usize {
  return length;
}

function put(byte: u32): void {
  if (length < CAPACITY) {
    store<u8>(buffer + length, <u8>byte);
    length++;
  }
}

/** Appends a literal. Characters beyond U+FFFF do not occur in our texts. */
export function diagnose(text: string): void {
  for (let i = 0, n = text.length; i < n; i++) {
    const c = <u32>load<u16>(changetype<usize>(text) + (<usize>i << 1));
    if (c < 0x80) {
      put(c);
    } else if (c < 0x800) {
      put(0xc0 | (c >> 6));
      put(0x80 | (c & 63));
    } else {
      put(0xe0 | (c >> 12));
      put(0x80 | ((c >> 6) & 63));
      put(0x80 | (c & 63));
    }
  }
}

export function diagnoseInteger(value: i64): void {
  if (value < 0) {
    put(45);
    value = -value;
  }
  let divisor: i64 = 1;
  while (value / divisor >= 10) divisor *= 10;
  for (; divisor > 0; divisor /= 10) put(<u32>(48 + (value / divisor) % 10));
}

/** Appends `value` with six significant digits as d.ddddde±x. */
export function diagnoseNumber(value: f64): void {
  if (!isFinite(value)) return diagnose(isNaN(value) ? "NaN" : value > 0 ? "infinity" : "-infinity");
  if (value < 0) {
    put(45);
    value = -value;
  }
  let exponent: i64 = 0;
  if (value > 0) {
    while (value >= 10) {
      value /= 10;
      exponent++;
    }
    while (value < 1) {
      value *= 10;
      exponent--;
    }
  }
  let digits = <i64>(value * 1e5 + 0.5);
  if (digits >= 1000000) {
    digits /= 10;
    exponent++;
  }
  put(<u32>(48 + digits / 100000));
  put(46);
  for (let divisor: i64 = 10000; divisor > 0; divisor /= 10) put(<u32>(48 + (digits / divisor) % 10));
  if (exponent != 0) {
    put(101);
    diagnoseInteger(exponent);
  }
}

/** Clears, writes one sentence and hands the status back: `return fail(INVALID_PARAMETER, "…")`. */
export function fail(status: i32, text: string): i32 {
  clearDiagnostic();
  diagnose(text);
  return status;
}
