/**
 * Landau levels of one Dirac cone on a staggered real-space grid, extrapolated from three grids.
 *
 *   E ψ = (V + m) ψ + ħv (d_x + τQ) χ,  E χ = (V − m) χ + ħv (−d_x + τQ) ψ,  Q = k + x/l²,  V = F x;
 *   ψ and χ on alternate sites h/2 apart: real symmetric tridiagonal, bonds ħv(±1/h + τ Q(middle of the bond)/2).
 *
 * The symbol (2i/h) sin(ph/2) + Q cos(ph/2) has one zero in the zone: no doubled levels. Both ends carry the component
 * that holds n = 0 (B for τ sgn(B) = +1), so the box adds no edge states and the chain's middle level is n = 0.
 *
 * Source    staggered first-order operator: own derivation, after L. Susskind, Phys. Rev. D 16, 3031 (1977);
 *           L. F. Richardson, Phil. Trans. R. Soc. A 226 (1927) 299 for the extrapolation.
 * Accuracy  h², even powers only: the three-grid limit is good to about h⁶; `errors` estimates it.
 * Fails     false when the solver's counts do not close (never seen on an open chain).
 */
import { at, put } from "../../doubles";
import { reserveF64 } from "../../arena";
import { HBAR_OVER_E } from "../../constants";
import { newChain, sealChain } from "../../solvers/chain";
import { electricField, mass, velocity, wave } from "./parameters";
import { crossedRatio, ladderSquare } from "./monolayer";
import { provedLevels } from "./proved-levels";

/** Levels −top … top on one grid of `cells` cells between x = from and x = to (nm). */
export function levelsOnGrid(b: f64, tau: f64, top: i32, from: f64, to: f64, cells: i32, values: usize, errors: usize): bool {
  const chain = newChain(2 * cells + 1, false);
  const step = (to - from) / <f64>cells;
  const inverse = b / HBAR_OVER_E;
  const endsOnB = tau * b > 0;
  for (let i = 0; i <= 2 * cells; i++) {
    const x = from + 0.5 * step * <f64>i;
    const isB = endsOnB == ((i & 1) == 0);
    put(chain.diagonal, i, electricField * x + (isB ? -mass : mass));
    if (i == 0) continue;
    const half = 0.5 * tau * (wave + (x - 0.25 * step) * inverse);
    // a bond A–B has +1/h, a bond B–A has −1/h
    put(chain.bonds, i, velocity * (isB ? 1 / step + half : -1 / step + half));
  }
  sealChain(chain);
  return provedLevels(chain, cells - top, 2 * top + 1, values, errors);
}

/**
 * Levels −top … top of valley tau; `finest` cells per magnetic length on the finest grid, a box of `box` magnetic
 * lengths on either side of the orbits. Requires hasLevels(b).
 */
export function monolayerGrid(b: f64, tau: f64, top: i32, finest: i32, box: f64, values: usize, errors: usize): bool {
  const count = 2 * top + 1;
  const beta = crossedRatio(b);
  const gamma2 = 1 / ((1 - beta) * (1 + beta));
  const length2 = HBAR_OVER_E / b; // signed
  const length = Math.sqrt(Math.abs(length2));
  // orbits sit at x = −l²(k + βε/(1 − β²)), ε = (E + βħvk)/ħv from −top to top; they widen as (1 − β²)^(−1/4)
  const reach = Math.sqrt(mass * mass + <f64>top * ladderSquare(b)) / velocity;
  const middle = -length2 * wave;
  const spread = Math.abs(length2 * beta * reach * gamma2);
  const half = spread + box * length * Math.sqrt(Math.sqrt(gamma2));
  const cells = <i32>Math.max(4, Math.ceil((0.5 * half * <f64>finest) / length)); // of the coarsest grid
  const coarse = reserveF64(count);
  const fine = reserveF64(count);
  if (!levelsOnGrid(b, tau, top, middle - half, middle + half, cells, coarse, errors)) return false;
  if (!levelsOnGrid(b, tau, top, middle - half, middle + half, 2 * cells, fine, errors)) return false;
  if (!levelsOnGrid(b, tau, top, middle - half, middle + half, 4 * cells, values, errors)) return false;
  for (let i = 0; i < count; i++) extrapolate(i, coarse, fine, values, errors);
  return true;
}

/**
 * Limit of three grids h, h/2, h/4 in even powers; the error is the last step of the extrapolation. Differences that do not shrink four-fold (factor outside 3 … 5) are
 * not extrapolated: the finest value stands with its last change as error.
 */
function extrapolate(i: i32, coarse: usize, fine: usize, values: usize, errors: usize): void {
  const finest = at(values, i);
  const first = at(coarse, i) - at(fine, i);
  const second = at(fine, i) - finest;
  const factor = second == 0 ? 0 : first / second;
  if (factor >= 3 && factor <= 5) {
    const low = at(fine, i) - first / 3;
    const high = finest - second / 3;
    const step = (high - low) / 15;
    put(values, i, high + step);
    put(errors, i, at(errors, i) + Math.abs(step));
  } else {
    put(errors, i, at(errors, i) + Math.abs(second));
  }
}
