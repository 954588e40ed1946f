/** The record of `continuum-ribbon`, read and resolved once by `open`; nothing here changes afterwards. */
import { Axis, readAxis } from "../../axis";
import { BOHR_MAGNETON, HBAR_OVER_E } from "../../constants";
import { diagnose, diagnoseInteger, diagnoseNumber, fail } from "../../diagnostic";
import { Profile, PROFILE_NONE, PROFILE_STEPS, profileIntegral, profileStatus, profileValue, readProfile } from "../../profile";
import { readBlock, readInteger, readNumber, recordStatus } from "../../record";
import { INVALID_PARAMETER, OK } from "../../status";

export const ZIGZAG: i32 = 0;
export const ARMCHAIR: i32 = 1;
export const INFINITE_MASS: i32 = 2;
export const PERIODIC: i32 = 3;

export let edge: i32 = 0;
export let lowerSign: i32 = 1;
export let upperSign: i32 = 1;
/** Phase from one end to the other: Φ(x + length) = e^{iθ} Φ(x), of a periodic or unfolded armchair ring. */
export let ringCosine: f64 = 1;
export let ringSine: f64 = 0;
/** 1: K, 2: K′, 3: both separately; an armchair edge mixes them and has one row only. */
export let valleyCount: i32 = 1;
let firstValley: f64 = 1;
export let widthNm: f64 = 0;
/** ħv in eV nm. */
export let velocity: f64 = 0;
/** Signed 1/l² = eB/ħ in 1/nm². */
export let inverseArea: f64 = 0;
export let fieldT: f64 = 0;
export let kAxis: Axis = changetype<Axis>(0);
export let potential: Profile = changetype<Profile>(0);
export let mass: Profile = changetype<Profile>(0);
export let valleyMass: Profile = changetype<Profile>(0);
export let gauge: Profile = changetype<Profile>(0);
export let fieldProfile: Profile = changetype<Profile>(0);
export let spinCount: i32 = 1;
/** Channels are counted this many times. */
export let spinFactor: f64 = 1;
/** Spin s = ±1 shifts the energies by s times this. */
export let zeemanEv: f64 = 0;
export let energyAxis: Axis = changetype<Axis>(0);
export let temperatureK: f64 = 0;
export let isWindow: bool = false;
export let windowMin: f64 = 0;
export let windowMax: f64 = 0;
export let nearestEnergy: f64 = 0;
export let nearestCount: i32 = 0;
/** 3 grids with extrapolation, or 1. */
export let gridCount: i32 = 3;
export let cells: i32 = 0;
export let stateCount: i32 = 0;
export let states: usize = 0;

let widthKind: i32 = 0;
let widthValue: f64 = 0;
let widthRule: i32 = 0;
let blochPhase: f64 = 0;
let bondLength: f64 = 0;
let valleysWanted: i32 = 2;

export function readParameters(): i32 {
  edge = readInteger();
  lowerSign = 1;
  upperSign = 1;
  blochPhase = 0;
  if (edge == INFINITE_MASS) {
    lowerSign = readInteger();
    upperSign = readInteger();
  } else if (edge == PERIODIC) blochPhase = readNumber();
  valleysWanted = readInteger();
  widthKind = readInteger();
  widthValue = readNumber();
  widthRule = widthKind == 2 ? readInteger() : 0;
  velocity = readNumber();
  bondLength = readNumber();
  fieldT = readNumber();
  inverseArea = fieldT / HBAR_OVER_E;
  kAxis = readAxis();
  potential = readProfile();
  mass = readProfile();
  valleyMass = readProfile();
  gauge = readProfile();
  fieldProfile = readProfile();
  readSpin();
  energyAxis = readAxis();
  temperatureK = readNumber();
  isWindow = readInteger() == 0;
  if (isWindow) {
    windowMin = readNumber();
    windowMax = readNumber();
  } else {
    nearestEnergy = readNumber();
    nearestCount = readInteger();
  }
  gridCount = readInteger() == 0 ? 3 : 1;
  cells = readInteger();
  stateCount = readInteger();
  states = readBlock(stateCount);
  const whole = recordStatus();
  return whole == OK ? resolve() : whole;
}

function readSpin(): void {
  zeemanEv = 0;
  spinFactor = 1;
  spinCount = 1;
  if (readInteger() == 0) {
    spinFactor = <f64>readInteger();
    return;
  }
  const gFactor = readNumber();
  const tilt = readNumber();
  spinCount = 2;
  // the spin sees the whole field B/cos ϑ
  zeemanEv = (0.5 * gFactor * BOHR_MAGNETON * fieldT) / Math.cos((tilt * Math.PI) / 180);
}

/** Valley sign of row v: +1 for K and for the unfolded armchair ring. */
export function valleySign(v: i32): f64 {
  return v == 0 ? firstValley : -firstValley;
}
/** What the result says of row v: +1 K, −1 K′, 0 both mixed. */
export function valleyCode(v: i32): i32 {
  return edge == ARMCHAIR ? 0 : <i32>valleySign(v);
}
/** Spin of row s: 0 when spins are counted, else −1, +1. */
export function spinCode(s: i32): i32 {
  return spinCount == 1 ? 0 : 2 * s - 1;
}
export function spinShift(s: i32): f64 {
  return <f64>spinCode(s) * zeemanEv;
}

function resolve(): i32 {
  valleyCount = edge == ARMCHAIR ? 1 : valleysWanted == 2 ? 2 : 1;
  firstValley = edge != ARMCHAIR && valleysWanted == 1 ? -1 : 1;
  const status = resolveEdge();
  if (status != OK) return status;
  const half = 0.5 * widthNm;
  let code = profileStatus(potential, "potentialEv", -half, half);
  if (code == OK) code = profileStatus(mass, "massEv", -half, half);
  if (code == OK) code = profileStatus(valleyMass, "valleyMassEv", -half, half);
  if (code == OK) code = profileStatus(gauge, "gaugePerNm", -half, half);
  if (code == OK) code = profileStatus(fieldProfile, "fieldProfileT", -half, half);
  if (code != OK) return code;
  if (edge == PERIODIC && !fieldAverages()) {
    return fail(INVALID_PARAMETER, "A periodic edge needs a field whose integral over the width is 0: take fieldT and the mean of fieldProfileT opposite.");
  }
  return resolveRequest();
}

function resolveEdge(): i32 {
  const latticeNm = Math.sqrt(3) * bondLength;
  if (edge == INFINITE_MASS && (lowerSign * lowerSign != 1 || upperSign * upperSign != 1)) {
    return fail(INVALID_PARAMETER, "lowerSign and upperSign are the signs of the mass outside: +1 or −1.");
  }
  if (edge == ARMCHAIR && valleysWanted != 2) {
    return fail(INVALID_PARAMETER, "An armchair edge mixes the valleys: valleys must be both.");
  }
  if (widthKind == 0) widthNm = widthValue;
  else if (widthKind == 1) {
    if (edge != ARMCHAIR) return fail(INVALID_PARAMETER, "A width in dimer lines belongs to an armchair edge; give zigzag chains or nm.");
    widthNm = 0.5 * (widthValue + 1) * latticeNm;
  } else {
    if (edge != ZIGZAG) return fail(INVALID_PARAMETER, "A width in zigzag chains belongs to a zigzag edge; give dimer lines or nm.");
    // matching: the lattice's own lowest subband; geometric: from missing row to missing row
    widthNm = (1.5 * widthValue + (widthRule == 0 ? 0.75 : 1)) * bondLength;
  }
  ringCosine = 1;
  ringSine = 0;
  if (edge == PERIODIC) {
    ringCosine = Math.cos(blochPhase);
    ringSine = Math.sin(blochPhase);
  } else if (edge == ARMCHAIR && widthKind == 1) {
    // −2KW = −4π(N + 1)/3, exactly
    const rest = (<i32>widthValue + 1) % 3;
    ringCosine = rest == 0 ? 1 : -0.5;
    ringSine = rest == 0 ? 0 : rest == 1 ? 0.5 * Math.sqrt(3) : -0.5 * Math.sqrt(3);
  } else if (edge == ARMCHAIR) {
    const turns = (4 * widthNm) / (3 * latticeNm); // 2KW/2π
    const angle = -2 * Math.PI * (turns - Math.floor(turns));
    ringCosine = Math.cos(angle);
    ringSine = Math.sin(angle);
  }
  if (edge == ARMCHAIR && (cells & 1) != 0) {
    return fail(INVALID_PARAMETER, "An armchair ring needs an even number of cells, so that its two mirror points are sites.");
  }
  return OK;
}

/** Whether uniform and profile field cancel over the width, to 1e-9 of their size. */
function fieldAverages(): bool {
  const half = 0.5 * widthNm;
  const total = fieldT * widthNm + profileIntegral(fieldProfile, -half, half);
  let size = Math.abs(fieldT) * widthNm;
  const samples = 64;
  for (let i = 0; i < samples; i++) {
    size += (Math.abs(profileValue(fieldProfile, -half + ((<f64>i + 0.5) * widthNm) / <f64>samples)) * widthNm) / <f64>samples;
  }
  return Math.abs(total) <= 1e-9 * size;
}

function resolveRequest(): i32 {
  const rows = 2 * cells - (lowerSign != upperSign ? 1 : 0);
  if (isWindow && !(windowMin < windowMax)) return fail(INVALID_PARAMETER, "The window needs eMin < eMax.");
  if (!isWindow && nearestCount > rows - 6) {
    fail(INVALID_PARAMETER, "A grid of ");
    diagnoseInteger(cells);
    diagnose(" cells cannot prove that many levels: take more cells or a smaller count.");
    return INVALID_PARAMETER;
  }
  for (let i = 0; i < stateCount; i++) {
    const k = load<f64>(states + (<usize>i << 3));
    if (k < 0 || k >= <f64>kAxis.count || (i > 0 && k <= load<f64>(states + (<usize>(i - 1) << 3)))) {
      fail(INVALID_PARAMETER, "states must be increasing indices of the k axis; ");
      diagnoseNumber(k);
      diagnose(" is not.");
      return INVALID_PARAMETER;
    }
  }
  return OK;
}

/** Whether the k axis increases, which gaps and channels need. */
export function kIncreases(): bool {
  for (let i = 1; i < kAxis.count; i++) if (!(kAxis.at(i) > kAxis.at(i - 1))) return false;
  return kAxis.count > 2;
}

export function isMassDomain(): bool {
  return edge == INFINITE_MASS && lowerSign != upperSign;
}
export function isRing(): bool {
  return edge == ARMCHAIR || edge == PERIODIC;
}
/** Length of the chain in nm: the width, or twice the width for the unfolded armchair ring. */
export function chainLength(): f64 {
  return edge == ARMCHAIR ? 2 * widthNm : widthNm;
}
export function hasNoProfiles(): bool {
  return potential.kind == PROFILE_NONE && mass.kind == PROFILE_NONE && valleyMass.kind == PROFILE_NONE &&
    gauge.kind == PROFILE_NONE && fieldProfile.kind == PROFILE_NONE;
}
export function hasSteps(): bool {
  return potential.kind == PROFILE_STEPS || mass.kind == PROFILE_STEPS || valleyMass.kind == PROFILE_STEPS ||
    gauge.kind == PROFILE_STEPS || fieldProfile.kind == PROFILE_STEPS;
}
