/**
 * Landau levels of one Dirac cone, in closed form.
 *
 *   E_n = sgn(n) s √(m² + 2|n| s (ħv/l)²) − β ħv k,   E_0 = −τ sgn(B) m s − β ħv k,
 *   β = F l²/(ħv) with the sign of B in l², s = √(1 − β²), l² = ħ/(eB)
 *
 * Source    J. W. McClure, Phys. Rev. 104, 666 (1956); V. Lukose, R. Shankar, G. Baskaran, PRL 98, 116802 (2007) for
 *           the crossed field; with a mass from the boost E' → E'/γ, B' = B s (own derivation).
 * Accuracy  A few ε relative.   Fails  where there is no discrete spectrum: B = 0 or |β| ≥ 1.
 */
import { put } from "../../doubles";
import { HBAR_OVER_E } from "../../constants";
import { electricField, mass, maxIndex, velocity, wave } from "./parameters";

/** β in the field b (T); meaningless at b = 0. */
export function crossedRatio(b: f64): f64 {
  return (electricField * HBAR_OVER_E) / (b * velocity);
}

/** w² = 2 (ħv/l)² in eV². */
export function ladderSquare(b: f64): f64 {
  return (2 * velocity * velocity * Math.abs(b)) / HBAR_OVER_E;
}

/** Whether a discrete ladder exists in the field b. */
export function hasLevels(b: f64): bool {
  return b != 0 && Math.abs(crossedRatio(b)) < 1;
}

/** Levels −maxIndex … maxIndex of valley tau, ascending. Requires `hasLevels(b)`. */
export function monolayerLevels(b: f64, tau: f64, values: usize): void {
  const beta = crossedRatio(b);
  const s = Math.sqrt((1 - beta) * (1 + beta));
  const shift = -beta * velocity * wave;
  const square = ladderSquare(b);
  for (let n = 1; n <= maxIndex; n++) {
    const level = s * Math.sqrt(mass * mass + <f64>n * s * square);
    put(values, maxIndex - n, shift - level);
    put(values, maxIndex + n, shift + level);
  }
  put(values, maxIndex, shift - (b > 0 ? tau : -tau) * mass * s);
}
