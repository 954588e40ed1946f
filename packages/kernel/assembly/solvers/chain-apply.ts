/** Residuals of a chain's levels: ‖H z − λ z‖ for a unit z, real for open chains and complex for rings. */
import { Chain } from "./chain";
import { at } from "../doubles";

export function chainResidual(chain: Chain, level: f64, z: usize): f64 {
  return chain.closed ? ringResidual(chain, level, z) : openResidual(chain, level, z);
}

function openResidual(chain: Chain, level: f64, z: usize): f64 {
  const n = chain.n;
  let sum: f64 = 0;
  let before: f64 = 0;
  for (let i = 0; i < n; i++) {
    const after = i + 1 < n ? at(chain.bonds, i + 1) * at(z, i + 1) : 0;
    const r = (at(chain.diagonal, i) - level) * at(z, i) + before + after;
    if (i + 1 < n) before = at(chain.bonds, i + 1) * at(z, i);
    sum += r * r;
  }
  return Math.sqrt(sum);
}

function ringResidual(chain: Chain, level: f64, z: usize): f64 {
  const n = chain.n;
  const corner = at(chain.bonds, 0);
  const lr = at(z, 2 * n - 2), li = at(z, 2 * n - 1);
  // row 0: corner·e^{iθ} z[n−1];  row n−1: corner·e^{−iθ} z[0]
  let beforeRe = corner * (chain.cosine * lr - chain.sine * li);
  let beforeIm = corner * (chain.cosine * li + chain.sine * lr);
  let sum: f64 = 0;
  for (let i = 0; i < n; i++) {
    const re = at(z, 2 * i), im = at(z, 2 * i + 1);
    let afterRe: f64, afterIm: f64;
    let bond: f64 = 0;
    if (i + 1 < n) {
      bond = at(chain.bonds, i + 1);
      afterRe = bond * at(z, 2 * i + 2);
      afterIm = bond * at(z, 2 * i + 3);
    } else {
      afterRe = corner * (chain.cosine * at(z, 0) + chain.sine * at(z, 1));
      afterIm = corner * (chain.cosine * at(z, 1) - chain.sine * at(z, 0));
    }
    const shifted = at(chain.diagonal, i) - level;
    const rr = shifted * re + beforeRe + afterRe;
    const ri = shifted * im + beforeIm + afterIm;
    sum += rr * rr + ri * ri;
    beforeRe = bond * re;
    beforeIm = bond * im;
  }
  return Math.sqrt(sum);
}
