/**
 * Staggered grids of a ribbon: where the sites and bonds lie and what of them does not depend on k.
 *
 * Site i lies at i·h/2 from the first node (armchair: −W, the other edges: y = 0 is node −1 or 0, see `offset`); even
 * and odd sites carry the two components. A grid keeps, per site, the diagonal without k and, per bond, the field of
 * the off-diagonal without k:
 *
 *   zigzag          B at (j−½)h, A at jh, h = W/(M+½): diagonal V∓m, bonds ħv(±1/h + Q/2),  Q = τ(k − ∫B) + A
 *   armchair        ring of length 2W, h = 2W/M, A at −W + jh: V ± m, bonds ħv(±1/h + Q/2), Q = k + ∫B + sgn(x) A
 *   infinite mass   S or D first by the lower sign, h = W/(M+½), or W/M for a mass domain: V ± ħvQ, bonds ħv(±1/h + μ/2)
 *   periodic        ring of length W, h = W/M, A at jh, bonds as zigzag
 *
 * Source    R. Stacey, Phys. Rev. D 26, 468 (1982); L. Susskind, Phys. Rev. D 16, 3031 (1977) (from memory); the boundary
 *           conditions: L. Brey, H. A. Fertig, PRB 73, 235411 (2006); M. V. Berry, R. J. Mondragon, Proc. R. Soc. A 412,
 *           53 (1987) (both from memory).
 * Accuracy  second order in h with even powers for smooth profiles. Values are taken at sites and bond midpoints; where
 *           a profile has steps, the exact mean over the site's cell or the bond is taken instead.
 */
import { reserve, reserveF64 } from "../../arena";
import { HBAR_OVER_E } from "../../constants";
import { at, put } from "../../doubles";
import { Profile, PROFILE_NONE, PROFILE_STEPS, profileAverage, profileIntegral, profileValue } from "../../profile";
import { Chain, newChain, sealChain } from "../../solvers/chain";
import {
  ARMCHAIR, chainLength, edge, fieldProfile, gauge, inverseArea, INFINITE_MASS, isMassDomain, isRing, lowerSign, mass,
  PERIODIC, potential, ringCosine, ringSine, valleyMass, velocity, widthNm, ZIGZAG,
} from "./parameters";

@unmanaged
export class Grid {
  cells: i32;
  /** Sites of the chain. */
  n: i32;
  /** Distance of equal components, in nm. */
  h: f64;
  /** Position of site 0 in nm from the lower edge (armchair: −W). */
  offset: f64;
  /** Per site: eV, without k. */
  diagonal: usize;
  /** Per site: factor of k in the diagonal, in eV nm (infinite mass only, else 0). */
  slope: f64;
  /** Per bond i (between i−1 and i): eV, without k. */
  bonds: usize;
  /** Signed index 0 is the level number `half` of the matrix: the lowest conduction level. */
  half: i32;
}

/** Sites for `cells` cells. */
export function siteCount(cells: i32): i32 {
  return 2 * cells - (isMassDomain() ? 1 : 0);
}

function spacing(cells: i32): f64 {
  if (isRing()) return chainLength() / <f64>cells;
  return widthNm / (<f64>cells + (isMassDomain() ? 0 : 0.5));
}

/** +1 where the component that meets +m (A) or +ħvQ (S) sits on site i, else −1. */
@inline
export function componentSign(i: i32): f64 {
  const even = (i & 1) == 0;
  if (edge == ZIGZAG) return even ? -1 : 1; // B first
  if (edge == INFINITE_MASS) return even == lowerSign > 0 ? 1 : -1; // S first for s = +1
  return even ? 1 : -1; // A first
}

export function makeGrid(cells: i32, valley: f64, shift: f64): Grid {
  const grid = changetype<Grid>(reserve(offsetof<Grid>()));
  const n = siteCount(cells);
  grid.cells = cells;
  grid.n = n;
  grid.h = spacing(cells);
  grid.half = n / 2;
  grid.offset = edge == ARMCHAIR ? -widthNm : edge == PERIODIC ? 0 : 0.5 * grid.h;
  grid.diagonal = reserveF64(n);
  grid.bonds = reserveF64(n);
  grid.slope = edge == INFINITE_MASS ? velocity * valley : 0;
  for (let i = 0; i < n; i++) {
    put(grid.diagonal, i, siteEnergy(grid, i, valley) + shift);
    put(grid.bonds, i, i > 0 || isRing() ? bondEnergy(grid, i, valley) : 0);
  }
  return grid;
}

/** Diagonal of site i without k. */
function siteEnergy(grid: Grid, i: i32, valley: f64): f64 {
  const x = grid.offset + 0.5 * <f64>i * grid.h;
  const sign = componentSign(i);
  const v = siteValue(potential, x, grid.h);
  if (edge == INFINITE_MASS) {
    const q = valley * kappaAt(x) + siteValue(gauge, x, grid.h);
    return v + sign * velocity * q;
  }
  let m = siteValue(mass, x, grid.h);
  if (edge == ARMCHAIR) {
    // odd under the unfolding: 0 at the two mirror points, where its two sides meet
    if (i != 0 && i != grid.n / 2) m += (x < 0 ? -1.0 : 1.0) * siteValue(valleyMass, x, grid.h);
  } else m += valley * siteValue(valleyMass, x, grid.h);
  return v + sign * m;
}

/** Off-diagonal between sites i−1 and i without k. */
function bondEnergy(grid: Grid, i: i32, valley: f64): f64 {
  // seen from the component with sign +1 (A, S), the other one above counts ∓1/h
  const above = componentSign(i - 1) > 0; // the site before the corner of a ring is of the other kind too
  const upward = edge == ZIGZAG || edge == PERIODIC ? -1.0 : 1.0;
  const difference = (above ? upward : -upward) / grid.h;
  const from = grid.offset + 0.5 * <f64>(i - 1) * grid.h;
  const to = from + 0.5 * grid.h;
  let q: f64;
  if (edge == INFINITE_MASS) q = (bondValue(mass, from, to) + valley * bondValue(valleyMass, from, to)) / velocity;
  else if (edge == ARMCHAIR) {
    const a = i == 0 ? widthNm - 0.5 * grid.h : from; // the corner bond lies below x = W
    const b = a + 0.5 * grid.h;
    const negative = a + b < 0;
    const low = negative ? -b : a;
    const high = negative ? -a : b;
    q = kappaOver(low, high) + (negative ? -1.0 : 1.0) * bondValue(gauge, low, high);
  } else {
    const a = i == 0 ? widthNm - 0.5 * grid.h : from;
    q = valley * kappaOver(a, a + 0.5 * grid.h) + bondValue(gauge, a, a + 0.5 * grid.h);
  }
  return velocity * (difference + 0.5 * q);
}

/** Profile at a site; steps: mean over its cell, folded back at the ends of the strip. */
function siteValue(profile: Profile, x: f64, h: f64): f64 {
  if (profile.kind == PROFILE_NONE) return 0;
  const half = 0.5 * widthNm;
  const y = Math.abs(x);
  if (profile.kind != PROFILE_STEPS) return profileValue(profile, y - half);
  const low = y - 0.5 * h;
  const high = y + 0.5 * h;
  if (edge == PERIODIC && low < 0) {
    // the cell of the seam lies half at either end
    return (profileIntegral(profile, -half, high - half) + profileIntegral(profile, low + half, half)) / h;
  }
  return profileAverage(profile, Math.max(low, 0) - half, Math.min(high, widthNm) - half);
}

/** Profile at a bond's midpoint; steps: mean over the bond. */
function bondValue(profile: Profile, a: f64, b: f64): f64 {
  if (profile.kind == PROFILE_NONE) return 0;
  const half = 0.5 * widthNm;
  if (profile.kind != PROFILE_STEPS) return profileValue(profile, 0.5 * (a + b) - half);
  return profileAverage(profile, a - half, b - half);
}

/** κ − k at y from the lower edge: ∓(e/ħ)∫₀ᵘ B, u = y − W/2; + for armchair. */
export function kappaAt(y: f64): f64 {
  const u = y - 0.5 * widthNm;
  let flux = u * inverseArea;
  if (fieldProfile.kind != PROFILE_NONE) flux += profileIntegral(fieldProfile, 0, u) / HBAR_OVER_E;
  return edge == ARMCHAIR ? flux : -flux;
}

/** κ − k of a bond: at its midpoint; a field with steps: exact mean of the broken line over the bond. */
function kappaOver(a: f64, b: f64): f64 {
  if (fieldProfile.kind != PROFILE_STEPS) return kappaAt(0.5 * (a + b));
  const half = 0.5 * widthNm;
  let sum: f64 = 0;
  let from = a;
  for (let i = 0; i < fieldProfile.count; i++) {
    const kink = at(fieldProfile.x, i) + half;
    if (kink <= from || kink >= b) continue;
    sum += 0.5 * (kappaAt(from) + kappaAt(kink)) * (kink - from);
    from = kink;
  }
  return (sum + 0.5 * (kappaAt(from) + kappaAt(b)) * (b - from)) / (b - a);
}

/** The chain of a grid, with room for it. */
export function chainOf(grid: Grid): Chain {
  return newChain(grid.n, isRing());
}

/** Fills and seals the chain for wave number k. */
export function fillChain(chain: Chain, grid: Grid, valley: f64, k: f64): void {
  const n = grid.n;
  chain.n = n;
  chain.cosine = ringCosine;
  chain.sine = -ringSine; // H[0][n−1] carries the inverse of the phase gained over the ring
  const quarter = edge == INFINITE_MASS ? 0 : 0.5 * velocity * (edge == ARMCHAIR ? 1 : valley) * k;
  for (let i = 0; i < n; i++) {
    put(chain.diagonal, i, at(grid.diagonal, i) + componentSign(i) * grid.slope * k);
    put(chain.bonds, i, at(grid.bonds, i) + quarter);
  }
  sealChain(chain);
}
