/**
 * Trace of the transfer matrix around the unfolded armchair ring, an independent route to its levels.
 *
 *   d/dx (ψ_A, χ) = [[Q, −(ε + μ)], [ε − μ, −Q]] (ψ_A, χ),  ε = (E − V)/ħv, μ = m/ħv;   tr T(E) = 2 cos 2KW at a level
 *
 * by the fourth-order Magnus step Ω = h(A₁ + A₂)/2 + √3h²[A₂, A₁]/12 at two Gauss points, exp Ω in closed form.
 *
 * Source    S. Blanes, F. Casas, J. A. Oteo, J. Ros, Phys. Rep. 470, 151 (2009) (from memory); the trace condition is
 *           Hill's (common practice).
 * Output    trace = `traceMantissa`·e^{traceExponent}, ‖T‖ of order e^{traceExponent}.
 * Accuracy  O(h⁴) for smooth profiles; exact for a uniform ribbon.   Cost  about 60 ns a step without profiles.
 */
import { Profile, PROFILE_NONE, profileValue } from "../../profile";
import { kappaAt } from "./grid";
import { gauge, mass, potential, valleyMass, velocity, widthNm } from "./parameters";

export let traceMantissa: f64 = 0;
export let traceExponent: f64 = 0;

let q: f64 = 0;
let upper: f64 = 0; // −(ε + μ)
let lower: f64 = 0; // ε − μ

@inline
function value(profile: Profile, u: f64): f64 {
  return profile.kind == PROFILE_NONE ? 0 : profileValue(profile, u);
}

function coefficients(x: f64, energy: f64, k: f64): void {
  const y = Math.abs(x);
  const u = y - 0.5 * widthNm;
  const side: f64 = x < 0 ? -1 : 1;
  const epsilon = (energy - value(potential, u)) / velocity;
  const mu = (value(mass, u) + side * value(valleyMass, u)) / velocity;
  q = k + kappaAt(y) + side * value(gauge, u);
  upper = -(epsilon + mu);
  lower = epsilon - mu;
}

export function transferTrace(energy: f64, k: f64, steps: i32): void {
  // even, so that the mirror point x = 0 is a node
  const h = (2 * widthNm) / <f64>steps;
  const offset = 0.28867513459481287 * h; // √3/6
  let a: f64 = 1, b: f64 = 0, c: f64 = 0, d: f64 = 1;
  let exponent: f64 = 0;
  for (let i = 0; i < steps; i++) {
    const middle = -widthNm + (<f64>i + 0.5) * h;
    coefficients(middle - offset, energy, k);
    const q1 = q, u1 = upper, l1 = lower;
    coefficients(middle + offset, energy, k);
    // [A₂, A₁] for traceless 2×2 matrices
    const f = 0.14433756729740643 * h * h; // √3/12
    const p = 0.5 * h * (q1 + q) + f * (upper * l1 - u1 * lower);
    const r = 0.5 * h * (u1 + upper) + f * 2 * (q * u1 - q1 * upper);
    const s = 0.5 * h * (l1 + lower) + f * 2 * (lower * q1 - l1 * q);
    const delta = p * p + r * s;
    const root = Math.sqrt(Math.abs(delta));
    let even: f64, odd: f64; // cosh √δ, sinh √δ/√δ
    if (root < 1e-4) {
      even = 1 + 0.5 * delta;
      odd = 1 + delta / 6;
    } else if (delta > 0) {
      const e = Math.exp(root);
      even = 0.5 * (e + 1 / e);
      odd = (0.5 * (e - 1 / e)) / root;
    } else {
      even = Math.cos(root);
      odd = Math.sin(root) / root;
    }
    const t11 = even + odd * p, t12 = odd * r, t21 = odd * s, t22 = even - odd * p;
    const na = t11 * a + t12 * c, nb = t11 * b + t12 * d;
    c = t21 * a + t22 * c;
    d = t21 * b + t22 * d;
    a = na;
    b = nb;
    const size = Math.max(Math.max(Math.abs(a), Math.abs(b)), Math.max(Math.abs(c), Math.abs(d)));
    if (size > 1e20) {
      a /= size; b /= size; c /= size; d /= size;
      exponent += Math.log(size);
    }
  }
  traceMantissa = a + d;
  traceExponent = exponent;
}
