import { OK } from "../status";
export function open(): i32 { return OK; }
export function sliceCount(): i32 { return 1; }
export function sliceCost(slice: i32): f64 { return 1; }
export function computeSlice(slice: i32): i32 { return OK; }
export function assemble(): i32 { return OK; }
export function assembleCost(): f64 { return 1; }
