/**
 * The parameters of `landau-levels`, read once per record in the manifest's order. Written by `readParameters` only.
 */
import { Axis, readAxis } from "../../axis";
import { BOHR_MAGNETON, BOLTZMANN } from "../../constants";
import { diagnose, diagnoseInteger, fail } from "../../diagnostic";
import { isBroken, readInteger, readNumber } from "../../record";
import { INVALID_PARAMETER, INVALID_RECORD, METHOD_UNAVAILABLE, OK } from "../../status";

export const CLOSED_FORM: i32 = 1;
export const LADDER: i32 = 2;
export const GRID: i32 = 3;

export const NO_BROADENING: i32 = 0;
export const LORENTZIAN: i32 = 1;
export const GAUSSIAN: i32 = 2;

export let isBilayer: bool = false;
/** Monolayer: m in eV, F in eV/nm, k in 1/nm. */
export let mass: f64 = 0;
export let electricField: f64 = 0;
export let wave: f64 = 0;
/** Bilayer: γ₁, U and Δ in eV, v₃/v and v₄/v. */
export let gamma1: f64 = 0;
export let v3Ratio: f64 = 0;
export let v4Ratio: f64 = 0;
export let bias: f64 = 0;
export let dimerOffset: f64 = 0;

export let field: Axis = changetype<Axis>(0);
/** n from −maxIndex to +maxIndex. */
export let maxIndex: i32 = 0;
/** ħv in eV nm. */
export let velocity: f64 = 0;
export let valleyCount: i32 = 0;
let firstValley: f64 = 1;
export let spinCount: i32 = 1;
/** States per listed level: 1 or 2. */
export let spinFactor: f64 = 1;
/** Half the Zeeman splitting per tesla of the normal field, in eV/T. */
let zeemanPerTesla: f64 = 0;
export let carrier: Axis = changetype<Axis>(0);
/** k_B T in eV. */
export let thermalEnergy: f64 = 0;
export let broadening: i32 = 0;
/** Half width (Lorentzian) or standard deviation (Gaussian) in eV. */
export let lineWidth: f64 = 0;
export let energy: Axis = changetype<Axis>(0);
/** CLOSED_FORM, LADDER or GRID: `auto` is resolved. */
export let method: i32 = 0;
/** 0: the ladder chooses and proves its own size. */
export let ladderSize: i32 = 0;
export let gridCells: i32 = 0;
export let gridBox: f64 = 0;

/** +1 for K, −1 for K′. */
export function valleySign(valley: i32): f64 {
  return valley == 0 ? firstValley : -firstValley;
}

/** Energy of spin `spin` in the normal field b (T): 0 when degenerate, else ± (g/2) μ_B |b| / cos(tilt). */
export function spinEnergy(spin: i32, b: f64): f64 {
  if (spinCount == 1) return 0;
  return (spin == 0 ? 1 : -1) * zeemanPerTesla * Math.abs(b);
}

/** Listed levels per valley and spin: 2n + 1 of one layer; 2(n + 1) of two, counted from half filling. */
export function levelCount(): i32 {
  return isBilayer ? 2 * (maxIndex + 1) : 2 * maxIndex + 1;
}

/** Label of listed level i: −n … n, without 0 for two layers. */
export function levelLabel(i: i32): i32 {
  if (!isBilayer) return i - maxIndex;
  return i <= maxIndex ? i - maxIndex - 1 : i - maxIndex;
}

export function readParameters(): i32 {
  isBilayer = readInteger() == 1;
  if (isBilayer) {
    gamma1 = readNumber();
    v3Ratio = readNumber();
    v4Ratio = readNumber();
    bias = readNumber();
    dimerOffset = readNumber();
  } else {
    mass = readNumber();
    electricField = readNumber();
    wave = readNumber();
  }
  field = readAxis();
  maxIndex = readInteger();
  velocity = readNumber();
  const valleys = readInteger();
  valleyCount = valleys == 2 ? 2 : 1;
  firstValley = valleys == 1 ? -1 : 1;
  readSpin();
  carrier = readAxis();
  thermalEnergy = BOLTZMANN * readNumber();
  broadening = readInteger();
  lineWidth = broadening == NO_BROADENING ? 0 : readNumber();
  energy = readAxis();
  const requested = readInteger();
  ladderSize = requested == LADDER ? readInteger() : 0;
  gridCells = requested == GRID ? readInteger() : 0;
  gridBox = requested == GRID ? readNumber() : 0;
  if (isBroken()) return INVALID_RECORD;
  return resolveMethod(requested);
}

function readSpin(): void {
  if (readInteger() == 0) {
    spinCount = 1;
    spinFactor = <f64>readInteger();
    zeemanPerTesla = 0;
  } else {
    spinCount = 2;
    spinFactor = 1;
    const gFactor = readNumber();
    zeemanPerTesla = (0.5 * gFactor * BOHR_MAGNETON) / Math.cos((readNumber() * Math.PI) / 180);
  }
}

function resolveMethod(requested: i32): i32 {
  const hasClosedForm = !isBilayer || v3Ratio == 0;
  method = requested != 0 ? requested : hasClosedForm ? CLOSED_FORM : LADDER;
  if (method == CLOSED_FORM && !hasClosedForm) {
    return fail(METHOD_UNAVAILABLE, "Two layers with v₃ have no closed form; use the ladder.");
  }
  if (method == LADDER && !isBilayer && electricField != 0) {
    return fail(METHOD_UNAVAILABLE, "The ladder has no crossed field; use the closed form or the grid.");
  }
  if (method == GRID && isBilayer) {
    return fail(METHOD_UNAVAILABLE, "The grid is for one layer; use the closed form or the ladder.");
  }
  if (ladderSize != 0 && ladderSize < maxIndex + 2) {
    fail(INVALID_PARAMETER, "The ladder must hold two states more than the levels asked for: at least ");
    diagnoseInteger(maxIndex + 2);
    diagnose(".");
    return INVALID_PARAMETER;
  }
  // a level n reaches √(2n) magnetic lengths from its orbit's centre, and its tail three more
  if (method == GRID && gridBox < Math.sqrt(2 * <f64>maxIndex) + 3) {
    return fail(INVALID_PARAMETER, "The box is too small for the highest level: it must exceed √(2n) + 3 magnetic lengths.");
  }
  return OK;
}
