/**
 * Line shapes of a level and their occupied part.
 *
 *   density    Lorentzian (Γ/π)/(x² + Γ²) with half width Γ; Gaussian e^{−x²/2σ²}/(σ√2π)
 *   occupied   P(x) = ∫ L(ε) f(ε − x) dε, x = Fermi energy − level, f = 1/(1 + e^{ε/kT}):
 *     none        step (½ at 0), or 1/(1 + e^{−x/kT})
 *     Lorentzian  ½ + arctan(x/Γ)/π, or ½ + Im ψ(½ + (Γ + ix)/2πkT)/π
 *     Gaussian    ½ erfc(−x/σ√2), or the trapezoidal rule on the narrower factor; tabulated once per record
 *
 * Source    the digamma form: sum over the Matsubara poles of f, with M. Abramowitz, I. A. Stegun, Handbook, 6.3.16;
 *           the trapezoidal rule converges exponentially on analytic integrands: L. N. Trefethen, J. A. C. Weideman,
 *           SIAM Review 56 (2014) 385–458.
 * Accuracy  absolute 1e-14.   Fails  never.
 */
import { digammaImaginary } from "../../functions/digamma";
import { newStepPanels, StepPanels, stepValue } from "../../functions/chebyshev-panels";
import { erfc } from "../../functions/error-function";
import { broadening, GAUSSIAN, lineWidth, LORENTZIAN, thermalEnergy } from "./parameters";

const ROOT_HALF: f64 = 0.7071067811865476;
const ONE_OVER_ROOT_TWO_PI: f64 = 0.3989422804014327;

/** States per energy of one level at the distance x (eV) from it; in 1/eV. */
export function lineDensity(x: f64): f64 {
  if (broadening == LORENTZIAN) return lineWidth / (Math.PI * (x * x + lineWidth * lineWidth));
  const u = x / lineWidth;
  // beyond 38 σ the value is below the smallest normal double
  return Math.abs(u) > 38 ? 0 : (ONE_OVER_ROOT_TWO_PI / lineWidth) * Math.exp(-0.5 * u * u);
}

/** Occupied part (0 … 1) of a level x (eV) below the Fermi energy. */
export function occupiedPart(x: f64): f64 {
  if (broadening == LORENTZIAN) {
    if (thermalEnergy == 0) return 0.5 + Math.atan(x / lineWidth) / Math.PI;
    const scale = 1 / (2 * Math.PI * thermalEnergy);
    return 0.5 + digammaImaginary(0.5 + lineWidth * scale, x * scale) / Math.PI;
  }
  if (broadening == GAUSSIAN) return stepValue(gaussianPanels, x);
  if (thermalEnergy == 0) return x > 0 ? 1 : x < 0 ? 0 : 0.5;
  return fermi(x / thermalEnergy);
}

let gaussianPanels: StepPanels = changetype<StepPanels>(0);

/** Tabulates what is too dear to compute for every pair of level and energy. Called once per record. */
export function prepareLineShape(): void {
  if (broadening != GAUSSIAN) return;
  const scale = Math.max(lineWidth, thermalEnergy);
  const reach = 9 * lineWidth + 40 * thermalEnergy;
  gaussianPanels = newStepPanels(
    thermalEnergy == 0 ? gaussianStep : gaussianAtTemperature, scale, <i32>Math.ceil(reach / scale),
  );
}

function gaussianStep(x: f64): f64 {
  return 0.5 * erfc((-x / lineWidth) * ROOT_HALF);
}

/** 1/(1 + e^{−u}). */
function fermi(u: f64): f64 {
  if (u < -40) return Math.exp(Math.max(u, -700));
  return u > 40 ? 1 : 1 / (1 + Math.exp(-u));
}

function gaussianAtTemperature(x: f64): f64 {
  let sum = 0.0;
  if (thermalEnergy <= lineWidth) {
    // ∫ Φ((x + kT u)/σ) e^{−|u|}/(1 + e^{−|u|})² du; poles at iπ: step ½ leaves e^{−39}
    for (let i = -80; i <= 80; i++) {
      const u = 0.5 * <f64>i;
      const weight = Math.exp(-Math.abs(u));
      sum += (weight / ((1 + weight) * (1 + weight))) * 0.5 * erfc((-(x + thermalEnergy * u) / lineWidth) * ROOT_HALF);
    }
    return 0.5 * sum;
  }
  // ∫ φ(u) f((x − σu)/kT) du over ±9 σ in steps of ¼
  for (let i = -36; i <= 36; i++) {
    const u = 0.25 * <f64>i;
    sum += Math.exp(-0.5 * u * u) * fermi((x - lineWidth * u) / thermalEnergy);
  }
  return 0.25 * ONE_OVER_ROOT_TWO_PI * sum;
}
