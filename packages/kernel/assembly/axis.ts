/**
 * Axes: a bare number, a range, listed values, or (lattice models) the whole zone.
 *
 *   range value i = start + (stop − start)·i/(count − 1), the last exactly stop
 */
import { reserve, reserveF64 } from "./arena";
import { breakRecord, readBlock, readInteger, readNumber } from "./record";

export const AXIS_NUMBER: i32 = 0;
export const AXIS_RANGE: i32 = 1;
export const AXIS_VALUES: i32 = 2;
export const AXIS_WHOLE_ZONE: i32 = 3;

/** A materialised axis. `values` is 0 for a whole-zone axis until the model fills it with `fillRange`. */
@unmanaged
export class Axis {
  kind: i32;
  count: i32;
  values: usize;

  @inline
  at(i: i32): f64 {
    return load<f64>(this.values + (<usize>i << 3));
  }
}

/** Fills count values from start to stop; the last is stop itself, so that nested ranges share their ends. */
export function fillRange(values: usize, start: f64, stop: f64, count: i32): void {
  const last = count - 1;
  for (let i = 0; i < last; i++) {
    store<f64>(values + (<usize>i << 3), start + ((stop - start) * <f64>i) / <f64>last);
  }
  // a range of one point is its start; the host refuses count < 2
  store<f64>(values + (<usize>last << 3), count > 1 ? stop : start);
}

/** Reads an axis of the record into the arena. Only lattice models allow the whole zone, and fill its values themselves. */
export function readAxis(allowsWholeZone: bool = false): Axis {
  const axis = changetype<Axis>(reserve(offsetof<Axis>()));
  axis.kind = readInteger();
  axis.count = 1;
  axis.values = 0;
  if (axis.kind == AXIS_NUMBER) {
    axis.values = reserveF64(1);
    store<f64>(axis.values, readNumber());
  } else if (axis.kind == AXIS_RANGE) {
    const start = readNumber();
    const stop = readNumber();
    readCount(axis);
    axis.values = reserveF64(axis.count);
    fillRange(axis.values, start, stop, axis.count);
  } else if (axis.kind == AXIS_VALUES) {
    readCount(axis);
    axis.values = readBlock(axis.count);
  } else {
    readCount(axis);
    if (axis.kind != AXIS_WHOLE_ZONE || !allowsWholeZone) breakRecord();
  }
  return axis;
}

function readCount(axis: Axis): void {
  const count = readInteger();
  if (count < 1) breakRecord();
  axis.count = max(1, count);
}
