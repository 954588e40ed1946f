/**
 * Profiles: functions of u = position − centre in nm, as a record gives them.
 *
 *   none  polynomial Σ cₙ uⁿ  steps (constant between edges)  sine A·sin(2πu/period + phase)  table (monotone cubic)
 *
 * `profileIntegral` is exact to rounding and free of cancellation: Gauss–Legendre with six points on a polynomial
 * (degree ≤ 11), two points on each cubic piece, the product formula for a sine.
 */
import { reserve } from "./arena";
import { diagnose, fail } from "./diagnostic";
import { at } from "./doubles";
import { fillMonotoneSlopes, hermiteValue } from "./monotone-cubic";
import { readBlock, readInteger, readNumber } from "./record";
import { INVALID_PARAMETER, OK, OUTSIDE_TABLE } from "./status";

export const PROFILE_NONE: i32 = 0;
export const PROFILE_POLYNOMIAL: i32 = 1;
export const PROFILE_STEPS: i32 = 2;
export const PROFILE_SINE: i32 = 3;
export const PROFILE_TABLE: i32 = 4;

@unmanaged
export class Profile {
  kind: i32;
  /** Coefficients, edges or rows. */
  count: i32;
  /** Edges or table positions, in nm. */
  x: usize;
  /** Coefficients, step values or table values. */
  y: usize;
  /** Derivatives of the table at its rows. */
  slope: usize;
  amplitude: f64;
  /** 2π/period in 1/nm. */
  wave: f64;
  phase: f64;
  /** OK, or INVALID_PARAMETER when edges or rows do not increase or a count does not fit. */
  status: i32;
}

function increases(values: usize, count: i32): bool {
  for (let i = 1; i < count; i++) if (!(at(values, i) > at(values, i - 1))) return false;
  return true;
}

/** Reads a profile of the record into the arena. */
export function readProfile(): Profile {
  const profile = changetype<Profile>(reserve(offsetof<Profile>()));
  memory.fill(changetype<usize>(profile), 0, offsetof<Profile>());
  profile.kind = readInteger();
  if (profile.kind == PROFILE_POLYNOMIAL) {
    profile.count = readInteger();
    profile.y = readBlock(profile.count);
  } else if (profile.kind == PROFILE_STEPS) {
    profile.count = readInteger();
    profile.x = readBlock(profile.count);
    const values = readInteger();
    profile.y = readBlock(values);
    if (values != profile.count + 1 || !increases(profile.x, profile.count)) profile.status = INVALID_PARAMETER;
  } else if (profile.kind == PROFILE_SINE) {
    profile.amplitude = readNumber();
    profile.wave = (2 * Math.PI) / readNumber();
    profile.phase = readNumber();
  } else if (profile.kind == PROFILE_TABLE) {
    readTable(profile);
  }
  return profile;
}

function readTable(profile: Profile): void {
  const columns = readInteger();
  profile.count = readInteger();
  profile.x = readBlock(profile.count);
  profile.y = readBlock(profile.count);
  for (let column = 2; column < columns; column++) readBlock(profile.count);
  if (columns < 2 || profile.count < 2 || profile.x == 0 || profile.y == 0 || !increases(profile.x, profile.count)) {
    profile.status = INVALID_PARAMETER;
    return;
  }
  profile.slope = reserve(<u64>profile.count << 3);
  fillMonotoneSlopes(profile.x, profile.y, profile.slope, profile.count);
}

/** Whether the profile is well-formed and covers from … to; `name` begins the diagnostic. */
export function profileStatus(profile: Profile, name: string, from: f64, to: f64): i32 {
  if (profile.status != OK) {
    fail(profile.status, name);
    diagnose(profile.kind == PROFILE_STEPS
      ? ": edges must increase and values must be one more than edges."
      : ": a table needs two rows or more with increasing positions.");
    return profile.status;
  }
  if (profile.kind == PROFILE_TABLE && (from < at(profile.x, 0) || to > at(profile.x, profile.count - 1))) {
    fail(OUTSIDE_TABLE, name);
    diagnose(": the table does not cover the whole width.");
    return OUTSIDE_TABLE;
  }
  return OK;
}

/** Last i with x[i] ≤ u, or −1. */
function intervalOf(x: usize, count: i32, u: f64): i32 {
  let low = -1;
  let high = count;
  while (high - low > 1) {
    const middle = (low + high) >> 1;
    if (at(x, middle) <= u) low = middle;
    else high = middle;
  }
  return low;
}

/** Value at u. A step edge belongs to its right side; a table is not extrapolated (its end rows are held). */
export function profileValue(profile: Profile, u: f64): f64 {
  switch (profile.kind) {
    case PROFILE_POLYNOMIAL: {
      let sum = 0.0;
      for (let i = profile.count - 1; i >= 0; i--) sum = sum * u + at(profile.y, i);
      return sum;
    }
    case PROFILE_STEPS:
      return at(profile.y, intervalOf(profile.x, profile.count, u) + 1);
    case PROFILE_SINE:
      return profile.amplitude * Math.sin(profile.wave * u + profile.phase);
    case PROFILE_TABLE: {
      const last = profile.count - 1;
      if (u <= at(profile.x, 0)) return at(profile.y, 0);
      if (u >= at(profile.x, last)) return at(profile.y, last);
      return hermiteValue(profile.x, profile.y, profile.slope, intervalOf(profile.x, profile.count, u), u);
    }
    default:
      return 0;
  }
}

/** ∫ of the profile from a to b (signed); b − a in nm, so the unit is the profile's times nm. */
export function profileIntegral(profile: Profile, a: f64, b: f64): f64 {
  if (b < a) return -profileIntegral(profile, b, a);
  switch (profile.kind) {
    case PROFILE_POLYNOMIAL:
      return gaussSix(profile, a, b);
    case PROFILE_SINE: {
      const half = 0.5 * profile.wave * (b - a);
      return ((2 * profile.amplitude) / profile.wave) * Math.sin(0.5 * profile.wave * (a + b) + profile.phase) * Math.sin(half);
    }
    case PROFILE_STEPS:
    case PROFILE_TABLE: {
      let sum = 0.0;
      let from = a;
      for (let i = intervalOf(profile.x, profile.count, a) + 1; i < profile.count && at(profile.x, i) < b; i++) {
        sum += gaussTwo(profile, from, at(profile.x, i));
        from = at(profile.x, i);
      }
      return sum + gaussTwo(profile, from, b);
    }
    default:
      return 0;
  }
}

/** Mean over a … b, or the value where the interval is empty. */
export function profileAverage(profile: Profile, a: f64, b: f64): f64 {
  return a == b ? profileValue(profile, a) : profileIntegral(profile, a, b) / (b - a);
}

/** Exact for cubics: nodes ±1/√3. */
function gaussTwo(profile: Profile, a: f64, b: f64): f64 {
  const half = 0.5 * (b - a);
  const middle = 0.5 * (a + b);
  const offset = half * 0.5773502691896257;
  return half * (profileValue(profile, middle - offset) + profileValue(profile, middle + offset));
}

/** Exact to degree 11. Nodes and weights: M. Abramowitz, I. A. Stegun, Handbook, table 25.4, n = 6. */
function gaussSix(profile: Profile, a: f64, b: f64): f64 {
  const half = 0.5 * (b - a);
  const middle = 0.5 * (a + b);
  return half * (
    0.4679139345726910 * (profileValue(profile, middle - half * 0.2386191860831969) + profileValue(profile, middle + half * 0.2386191860831969)) +
    0.3607615730481386 * (profileValue(profile, middle - half * 0.6612093864662645) + profileValue(profile, middle + half * 0.6612093864662645)) +
    0.1713244923791704 * (profileValue(profile, middle - half * 0.9324695142031521) + profileValue(profile, middle + half * 0.9324695142031521))
  );
}
