/**
 * The interface between exports.ts and a model: six functions, chosen once per record.
 *
 * A model is one file of assembly/models with
 *   open(): i32           read the record's fields in the manifest's order, resolve axes, check; a status
 *   sliceCount(): i32     from the record alone
 *   sliceCost(i): f64     estimated floating-point operations
 *   computeSlice(i): i32  a status; leaves its payload through payload.ts
 *   assemble(): i32       a status; reads payloads, leaves the result through result.ts
 *   assembleCost(): f64
 * Its state are module variables, written by `open` only: slices depend neither on each other nor on their order.
 */
let openFunction: (() => i32) | null = null;
let sliceCountFunction: (() => i32) | null = null;
let sliceCostFunction: ((slice: i32) => f64) | null = null;
let computeSliceFunction: ((slice: i32) => i32) | null = null;
let assembleFunction: (() => i32) | null = null;
let assembleCostFunction: (() => f64) | null = null;

/** Makes a model the current one; answers true, so that it can stand in a `return`. */
export function use(
  open: () => i32,
  sliceCount: () => i32,
  sliceCost: (slice: i32) => f64,
  computeSlice: (slice: i32) => i32,
  assemble: () => i32,
  assembleCost: () => f64,
): bool {
  openFunction = open;
  sliceCountFunction = sliceCount;
  sliceCostFunction = sliceCost;
  computeSliceFunction = computeSlice;
  assembleFunction = assemble;
  assembleCostFunction = assembleCost;
  return true;
}

export function modelOpen(): i32 {
  return openFunction!();
}
export function modelSliceCount(): i32 {
  return sliceCountFunction!();
}
export function modelSliceCost(slice: i32): f64 {
  return sliceCostFunction!(slice);
}
export function modelComputeSlice(slice: i32): i32 {
  return computeSliceFunction!(slice);
}
export function modelAssemble(): i32 {
  return assembleFunction!();
}
export function modelAssembleCost(): f64 {
  return assembleCostFunction!();
}
