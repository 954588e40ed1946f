/**
 * Piecewise Chebyshev interpolation of a smooth odd-symmetric step: P(−x) = 1 − P(x), P = 1 beyond the last panel.
 *
 *   on a panel, P(x) = Σ' c_k T_k(t), c_k = (2/n) Σ_j P(x_j) cos(k π (j + ½)/n), t ∈ [−1, 1]; sum by Clenshaw
 *
 * Source    C. W. Clenshaw, Math. Comp. 9 (1955) 118–120; L. N. Trefethen, Approximation Theory and Approximation
 *           Practice (SIAM 2013) ch. 3–8.
 * Input     f on x ≥ 0, entire and smooth on the scale of the panel's width; `panels` of them.
 * Accuracy  1e-15 absolute where f varies like a Gaussian integral of the panel's width.
 * Cost      16 multiplications a value; 16 values of f and 256 cosines per panel to set up.   Fails  never.
 */
import { reserveF64 } from "../arena";
import { at, put } from "../doubles";

const NODES: i32 = 16;

@unmanaged
export class StepPanels {
  count: i32;
  width: f64;
  coefficients: usize;
}

export function newStepPanels(f: (x: f64) => f64, width: f64, count: i32): StepPanels {
  const panels = changetype<StepPanels>(reserveF64(3));
  panels.count = count;
  panels.width = width;
  panels.coefficients = reserveF64(<u64>count * NODES);
  const cosines = reserveF64(NODES * NODES);
  for (let k = 0; k < NODES; k++) {
    for (let j = 0; j < NODES; j++) put(cosines, k * NODES + j, Math.cos((Math.PI * <f64>k * (<f64>j + 0.5)) / NODES));
  }
  const values = reserveF64(NODES);
  for (let panel = 0; panel < count; panel++) {
    for (let j = 0; j < NODES; j++) put(values, j, f(width * (<f64>panel + 0.5 * (1 + at(cosines, NODES + j)))));
    for (let k = 0; k < NODES; k++) {
      let sum = 0.0;
      for (let j = 0; j < NODES; j++) sum += at(values, j) * at(cosines, k * NODES + j);
      put(panels.coefficients, panel * NODES + k, (sum * 2) / NODES);
    }
  }
  return panels;
}

export function stepValue(panels: StepPanels, x: f64): f64 {
  const size = Math.abs(x);
  const scaled = size / panels.width;
  let value = 1.0;
  if (scaled < <f64>panels.count) {
    const panel = <i32>scaled;
    const t = 2 * (scaled - <f64>panel) - 1;
    const c = panels.coefficients + (<usize>(panel * NODES) << 3);
    let b1 = 0.0;
    let b2 = 0.0;
    for (let k = NODES - 1; k > 0; k--) {
      const b0 = 2 * t * b1 - b2 + at(c, k);
      b2 = b1;
      b1 = b0;
    }
    value = t * b1 - b2 + 0.5 * at(c, 0);
  }
  return x < 0 ? 1 - value : value;
}
