/**
 * Landau levels of one Dirac cone from the matrix in the oscillator basis: the independent route to monolayer.ts.
 *
 *   H_K = [[m, w a], [w a⁺, −m]] for B > 0; A: 0 … N−1, B: 0 … N (each component its own length, so that the ladder
 *   closes; equal lengths would leave an orphaned top state near zero). Ordered B0, A0, B1, A1, B2 … it is tridiagonal.
 *   τ sgn(B) = −1 exchanges A and B, which is m → −m.
 *
 * Source    J. W. McClure, Phys. Rev. 104, 666 (1956); cut-off by component: own derivation.
 * Output    the 2·maxIndex + 1 levels around n = 0 and the half width of each one's proved interval.
 * Fails     false when the counts of the solver do not close (never seen on an open chain).
 */
import { Chain, newChain, sealChain } from "../../solvers/chain";
import { put } from "../../doubles";
import { mass, maxIndex } from "./parameters";
import { ladderSquare } from "./monolayer";
import { provedLevels } from "./proved-levels";

export function monolayerLadder(b: f64, tau: f64, size: i32, values: usize, errors: usize): bool {
  const chain: Chain = newChain(2 * size + 1, false);
  const lonely = (b > 0 ? -tau : tau) * mass;
  const square = ladderSquare(b);
  for (let n = 0; n <= size; n++) {
    put(chain.diagonal, 2 * n, lonely);
    if (n == size) break;
    put(chain.diagonal, 2 * n + 1, -lonely);
    put(chain.bonds, 2 * n + 1, 0); // state n of one component does not meet n of the other …
    put(chain.bonds, 2 * n + 2, Math.sqrt(square * <f64>(n + 1))); // … but n + 1
  }
  sealChain(chain);
  return provedLevels(chain, size - maxIndex, 2 * maxIndex + 1, values, errors);
}
