/**
 * Checks of the certificate that one slice can make: per code the worst of its points, by |computed − expected|/tolerance.
 * Codes are positions in the definition's list of checks; predicates and tolerances stand beside each.
 */
import { reserve } from "../../arena";
import { at, put } from "../../doubles";
import { intAt } from "../../solvers/chain-brackets";
import { PROFILE_NONE } from "../../profile";
import { uniformLevel } from "./closed-forms";
import {
  ARMCHAIR, edge, fieldT, gridCount, hasNoProfiles, hasSteps, INFINITE_MASS, inverseArea, isMassDomain, mass, PERIODIC,
  potential, ringCosine, spinCount, valleyMass, velocity, widthNm,
} from "./parameters";
import { Point } from "./point";
import { finest, finestChain, Setting } from "./setting";
import { traceExponent, traceMantissa, transferTrace } from "./transfer-trace";

export const QUANTISATION: i32 = 0;
export const LANDAU_LADDER: i32 = 1;
export const TRANSFER_TRACE: i32 = 2;
export const PLUS_MINUS: i32 = 3;
export const PERIODIC_FORM: i32 = 4;
export const CHIRAL_MODE: i32 = 5;
export const CHECK_COUNT: i32 = 6;

/** Per code: made (0/1), computed, expected, tolerance. */
export const CHECK_DOUBLES: i32 = 4 * CHECK_COUNT;

export function newChecks(): usize {
  const checks = reserve(<u64>CHECK_DOUBLES * 8);
  memory.fill(checks, 0, <usize>CHECK_DOUBLES * 8);
  return checks;
}

/** Keeps the worse of two outcomes of one code. */
export function noteCheck(checks: usize, code: i32, computed: f64, expected: f64, tolerance: f64): void {
  const to = checks + <usize>code * 32;
  const worse = Math.abs(computed - expected) * at(to, 3) > Math.abs(at(to, 1) - at(to, 2)) * tolerance;
  if (at(to, 0) != 0 && !worse) return;
  put(to, 0, 1);
  put(to, 1, computed);
  put(to, 2, expected);
  put(to, 3, tolerance);
}

/**
 * Tolerance of a level against a closed form: ten of its error estimates and 1e-10 eV; of one grid without estimate the
 * second-order error of the staggered difference and mean, ħvκ³h²/4 with κ² = k² + (E/ħv)², and eight times that for
 * the end cells.
 */
function tolerance(setting: Setting, point: Point, i: i32): f64 {
  if (gridCount == 3) return 10 * at(point.errors, i) + 1e-10;
  const e = at(point.values, i) / velocity;
  const kappa2 = point.k * point.k + e * e;
  const h = finest(setting).h;
  return 2.25 * velocity * kappa2 * Math.sqrt(kappa2) * h * h + 1e-10;
}

export function checkPoint(checks: usize, setting: Setting, point: Point, shift: f64, firstOfSlice: bool): void {
  const uniform = fieldT == 0 && hasNoProfiles();
  for (let i = 0; i < point.count; i++) {
    if (intAt(point.chosen, i) == 0) continue;
    const index = point.first + i;
    if (uniform) {
      const code = edge == PERIODIC ? PERIODIC_FORM : isMassDomain() && index == 0 ? CHIRAL_MODE : QUANTISATION;
      noteCheck(checks, code, at(point.values, i), uniformLevel(index, point.k, setting.valley) + shift, tolerance(setting, point, i));
    }
  }
  if (hasSymmetricSpectrum()) checkSymmetry(checks, setting, point);
  if (point.k == 0 && fieldT != 0 && hasNoProfiles() && edge != PERIODIC && !isMassDomain()) checkLadder(checks, setting, point, shift);
  if (firstOfSlice && edge == ARMCHAIR && !hasSteps() && gridCount == 3) checkTrace(checks, setting, point, shift);
}

/** Without potential and masses the two components of zigzag, armchair and periodic ribbons anticommute with a sign. */
function hasSymmetricSpectrum(): bool {
  return edge != INFINITE_MASS && spinCount == 1 && potential.kind == PROFILE_NONE && mass.kind == PROFILE_NONE && valleyMass.kind == PROFILE_NONE;
}

/** E of index i against −E of index −1−i: equal on every grid, so to rounding. */
function checkSymmetry(checks: usize, setting: Setting, point: Point): void {
  for (let i = 0; i < point.count; i++) {
    const partner = -1 - (point.first + i) - point.first;
    if (partner < 0 || partner >= i || intAt(point.chosen, i) == 0 || intAt(point.chosen, partner) == 0) continue;
    noteCheck(checks, PLUS_MINUS, at(point.values, i), -at(point.values, partner), 256 * finestChain(setting).tolerance);
  }
}

/**
 * E_n = ±ħv√(2n)/l for orbits that end 3.5 magnetic lengths before the edges, in a ribbon wider than 12: the edge's
 * effect decays like exp(−(W/2l − √(2n+1))²).
 */
function checkLadder(checks: usize, setting: Setting, point: Point, shift: f64): void {
  const half = 0.5 * widthNm * Math.sqrt(Math.abs(inverseArea));
  if (half <= 6) return;
  for (let n = 1; ; n++) {
    const room = half - Math.sqrt(<f64>(2 * n + 1));
    if (room < 3.5) return;
    const level = velocity * Math.sqrt(2 * <f64>n * Math.abs(inverseArea));
    if (level + Math.abs(shift) >= Math.max(Math.abs(point.low), Math.abs(point.high))) return;
    for (let sign = -1; sign <= 1; sign += 2) {
      const expected = <f64>sign * level + shift;
      if (expected <= point.low || expected >= point.high) continue;
      let best = -1;
      for (let i = 0; i < point.count; i++) {
        if (best < 0 || Math.abs(at(point.values, i) - expected) < Math.abs(at(point.values, best) - expected)) best = i;
      }
      const edges = 100 * velocity * Math.sqrt(Math.abs(inverseArea)) * Math.exp(-room * room);
      noteCheck(checks, LANDAU_LADDER, at(point.values, best), expected, tolerance(setting, point, best) + edges);
    }
  }
}

/**
 * tr T(E) = 2 cos 2KW at the two lowest conduction levels, scaled by ‖T‖. The tolerance is the change of the trace when
 * E moves by ten error estimates and 1e-9 eV either way, which is quadratic where the root is double.
 */
function checkTrace(checks: usize, setting: Setting, point: Point, shift: f64): void {
  const steps = 2 * finest(setting).cells;
  for (let index = 0; index < 2; index++) {
    const i = index - point.first;
    if (i < 0 || i >= point.count || intAt(point.chosen, i) == 0) continue;
    const energy = at(point.values, i) - shift;
    const delta = 10 * at(point.errors, i) + 1e-9;
    transferTrace(energy, point.k, steps);
    const trace = traceMantissa;
    const exponent = traceExponent;
    let change: f64 = 0;
    for (let sign = -1; sign <= 1; sign += 2) {
      transferTrace(energy + <f64>sign * delta, point.k, steps);
      change = Math.max(change, Math.abs(traceMantissa * Math.exp(traceExponent - exponent) - trace));
    }
    noteCheck(checks, TRANSFER_TRACE, trace, 2 * ringCosine * Math.exp(-exponent), change + 1e-9);
  }
}
