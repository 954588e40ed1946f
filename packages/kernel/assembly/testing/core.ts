/** Exports for tests of the kernel's parts; this entry is never part of a released module. */
import { reserve } from "../arena";
import { put } from "../doubles";
import { bracketedRoot } from "../functions/bracketed-root";
import { bilayerBlockLevels, bilayerAtZeroField } from "./bilayer-at-zero-field";
import { openRecord, recordStatus } from "../record";
import { Profile, profileAverage, profileIntegral, profileStatus, profileValue, readProfile } from "../profile";

export { erfc } from "../functions/error-function";
export { digammaImaginary } from "../functions/digamma";
export { heapSort } from "../linalg/heap-sort";
export { realJacobi } from "../solvers/real-jacobi";
export { pentadiagonalToTridiagonal } from "../solvers/pentadiagonal-to-tridiagonal";
export { levelsOnGrid } from "../models/landau-levels/monolayer-grid";
export { bilayerLadder } from "../models/landau-levels/bilayer-ladder";
export { bilayerAtZeroField, bilayerBlockLevels };

let profile: Profile = changetype<Profile>(0);

/** Reads a record that holds one profile; status of the record, then of the profile over from … to. */
export function openProfile(pointer: usize, length: u32, from: f64, to: f64): i32 {
  openRecord(pointer, length);
  profile = readProfile();
  const status = recordStatus();
  return status != 0 ? status : profileStatus(profile, "profile", from, to);
}
export function valueAt(u: f64): f64 {
  return profileValue(profile, u);
}
export function integralOver(a: f64, b: f64): f64 {
  return profileIntegral(profile, a, b);
}
export function averageOver(a: f64, b: f64): f64 {
  return profileAverage(profile, a, b);
}

let calls: i32 = 0;
let target: f64 = 0;

/** Root of x³ − target in 0 … 10, and how many evaluations it took. */
export function cubeRoot(cube: f64): f64 {
  calls = 0;
  target = cube;
  return bracketedRoot((x: f64): f64 => {
    calls++;
    return x * x * x - target;
  }, 0, 10, -cube, 1000 - cube, 0);
}
export function rootCalls(): i32 {
  return calls;
}

/** Grows the memory until the machine or the module refuses. */
export function exhaust(bytes: u32): void {
  for (;;) put(reserve(bytes), 0, 1);
}
