/** Copies the rows of all fields into the arrays of the result, in the order of the definition's `results`. */
import { at } from "../../doubles";
import { Axis } from "../../axis";
import { addArray, F64, I32, U8 } from "../../result";
import { broadening, carrier, energy, field, levelCount, levelLabel, NO_BROADENING, spinCount, valleyCount, valleySign } from "./parameters";
import { chargeOffset, degeneracyOffset, densityOffset, energiesOffset, errorsOffset, fermiOffset, fermiValidOffset, fillingOffset, lengthOffset, plateauOffset, transitionOffset, transitionValidOffset, validOffset, wholeOffset } from "./row";
import { transitionCount, transitionFrom, transitionTo } from "./transitions";

export const ARRAY_COUNT: i32 = 26;

/** `rows` lists the address of every field's row, as u32. */
export function writeArrays(rows: usize): void {
  const levels = levelCount();
  const transitions = transitionCount();
  axisArray(0, field);
  axisArray(1, energy);
  axisArray(2, carrier);
  labelArrays(levels);
  const perValley = valleyCount * levels;
  const all = valleyCount * spinCount * levels;
  copySection(rows, addArray(6, F64, 4, field.count, valleyCount, spinCount, levels), energiesOffset, all);
  energiesValid(rows, addArray(7, U8, 4, field.count, valleyCount, spinCount, levels), levels);
  copySection(rows, addArray(8, F64, 3, field.count, valleyCount, levels), errorsOffset, perValley);
  if (broadening != NO_BROADENING) {
    copySection(rows, addArray(9, F64, 2, field.count, energy.count), densityOffset, energy.count);
    wholeFlags(rows, addArray(10, U8, 2, field.count, energy.count), energy.count);
  }
  copySection(rows, addArray(11, F64, 2, field.count, energy.count), chargeOffset, energy.count);
  wholeFlags(rows, addArray(12, U8, 2, field.count, energy.count), energy.count);
  copySection(rows, addArray(13, F64, 2, field.count, energy.count), plateauOffset, energy.count);
  wholeFlags(rows, addArray(14, U8, 2, field.count, energy.count), energy.count);
  copySection(rows, addArray(15, F64, 2, field.count, carrier.count), fermiOffset, carrier.count);
  copyFlags(rows, addArray(16, U8, 2, field.count, carrier.count), fermiValidOffset, carrier.count);
  copySection(rows, addArray(17, F64, 2, field.count, carrier.count), fillingOffset, carrier.count);
  fieldFlags(rows, addArray(18, U8, 2, field.count, carrier.count), carrier.count);
  const from = addArray(19, I32, 1, transitions);
  const to = addArray(20, I32, 1, transitions);
  for (let t = 0; t < transitions; t++) {
    store<i32>(from + (<usize>t << 2), transitionFrom(t));
    store<i32>(to + (<usize>t << 2), transitionTo(t));
  }
  const width = valleyCount * transitions;
  copySection(rows, addArray(21, F64, 3, field.count, valleyCount, transitions), transitionOffset, width);
  copyFlags(rows, addArray(22, U8, 3, field.count, valleyCount, transitions), transitionValidOffset, width);
  copySection(rows, addArray(23, F64, 1, field.count), lengthOffset, 1);
  fieldFlags(rows, addArray(24, U8, 1, field.count), 1);
  copySection(rows, addArray(25, F64, 1, field.count), degeneracyOffset, 1);
}

function axisArray(index: i32, axis: Axis): void {
  memory.copy(addArray(index, F64, 1, axis.count), axis.values, <usize>axis.count << 3);
}

function labelArrays(levels: i32): void {
  const valleys = addArray(3, I32, 1, valleyCount);
  for (let i = 0; i < valleyCount; i++) store<i32>(valleys + (<usize>i << 2), <i32>valleySign(i));
  const spins = addArray(4, I32, 1, spinCount);
  if (spinCount == 2) {
    store<i32>(spins, 1);
    store<i32>(spins, -1, 4);
  }
  const labels = addArray(5, I32, 1, levels);
  for (let i = 0; i < levels; i++) store<i32>(labels + (<usize>i << 2), levelLabel(i));
}

@inline
function rowOf(rows: usize, i: i32): usize {
  return <usize>load<u32>(rows + (<usize>i << 2));
}

function copySection(rows: usize, to: usize, offset: i32, width: i32): void {
  const bytes = <usize>width << 3;
  for (let i = 0; i < field.count; i++) memory.copy(to + <usize>i * bytes, rowOf(rows, i) + (<usize>offset << 3), bytes);
}

/** Flags kept as doubles in the row. */
function copyFlags(rows: usize, to: usize, offset: i32, width: i32): void {
  for (let i = 0; i < field.count; i++) {
    for (let j = 0; j < width; j++) store<u8>(to++, at(rowOf(rows, i), offset + j) != 0 ? 1 : 0);
  }
}

/** 1 along the row where every level of the field is valid. */
function wholeFlags(rows: usize, to: usize, width: i32): void {
  for (let i = 0; i < field.count; i++, to += <usize>width) {
    memory.fill(to, at(rowOf(rows, i), wholeOffset) != 0 ? 1 : 0, <usize>width);
  }
}

/** 1 along the row where the field is not zero. */
function fieldFlags(rows: usize, to: usize, width: i32): void {
  for (let i = 0; i < field.count; i++, to += <usize>width) {
    memory.fill(to, at(rowOf(rows, i), lengthOffset) != 0 ? 1 : 0, <usize>width);
  }
}

function energiesValid(rows: usize, to: usize, levels: i32): void {
  for (let i = 0; i < field.count; i++) {
    for (let valley = 0; valley < valleyCount; valley++) {
      for (let spin = 0; spin < spinCount; spin++) {
        for (let j = 0; j < levels; j++) store<u8>(to++, at(rowOf(rows, i), validOffset + valley * levels + j) != 0 ? 1 : 0);
      }
    }
  }
}
