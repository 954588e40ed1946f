/**
 * Root of a continuous function inside a bracket: inverse quadratic steps where they are safe, halving elsewhere.
 *
 * Source    T. R. Chandrupatla, Adv. Eng. Softw. 28 (1997) 145–149.
 * Input     f with values of opposite sign at low and high; `flat`: |f| at or below it counts as zero.
 * Output    x with |f(x)| ≤ flat, or the better end of a bracket of a few ε|x|.
 * Cost      6 to 9 evaluations as a rule, at most 3 per bit.   Fails  never.
 */
import { EPSILON } from "../constants";

export function bracketedRoot(f: (x: f64) => f64, low: f64, high: f64, atLow: f64, atHigh: f64, flat: f64): f64 {
  let a = low;
  let b = high;
  let c = low;
  let fa = atLow;
  let fb = atHigh;
  let fc = atLow;
  if (Math.abs(fa) <= flat) return a;
  if (Math.abs(fb) <= flat) return b;
  let t = fa / (fa - fb);
  for (let step = 0; step < 200; step++) {
    const x = a + t * (b - a);
    const fx = f(x);
    if (Math.abs(fx) <= flat) return x;
    if ((fx > 0) == (fa > 0)) {
      c = a;
      fc = fa;
    } else {
      c = b;
      fc = fb;
      b = a;
      fb = fa;
    }
    a = x;
    fa = fx;
    const best = Math.abs(fa) < Math.abs(fb) ? a : b;
    const closest = (2 * EPSILON * Math.abs(best)) / Math.abs(b - a);
    if (closest > 0.5 || a == b) return best;
    const xi = (a - b) / (c - b);
    const phi = (fa - fb) / (fc - fb);
    t = 0.5;
    if (phi * phi < xi && (1 - phi) * (1 - phi) < 1 - xi) {
      t = (fa / (fb - fa)) * (fc / (fb - fc)) + ((c - a) / (b - a)) * (fa / (fc - fa)) * (fb / (fc - fb));
    }
    t = Math.min(Math.max(t, closest), 1 - closest);
  }
  return Math.abs(fa) < Math.abs(fb) ? a : b;
}
