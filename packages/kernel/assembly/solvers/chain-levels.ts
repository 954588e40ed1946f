/**
 * Levels of a chain by index, with their vectors: brackets by bisection, refined by twisted Rayleigh-quotient steps
 * that never leave their bracket, and each proved by counts on both sides of the value returned.
 *
 * Source    chain-brackets.ts, twisted-step.ts, ring-step.ts; safeguarding as in R. P. Brent, Algorithms for
 *           Minimization without Derivatives (1973) ch. 4 (a step that leaves the bracket is replaced by halving).
 * Input     a sealed chain; first, count ≥ 1; guesses, widths or 0.
 * Output    values[count] ascending, errors[count] (half width of the proved interval of each value).
 * Accuracy  #(< value − error) ≤ j < #(< value + error) for every level j, error of a few ε‖H‖.
 * Cost      about 2 counts and 2–4 steps per level from good guesses, 12 counts more from none.
 * Fails     false when a ring's elimination grows from every start.
 */
import { mark, release, reserve, reserveF64 } from "../arena";
import { bisect, bracketGuesses, Brackets, intAt, isIsolated, learn, newBrackets, putInt } from "./chain-brackets";
import { Chain, chainCounts, FOLDS } from "./chain";
import { at, put } from "../doubles";
import { LONE, ringStep, ringStepBytes } from "./ring-step";
import { twistedBytes, twistedStep } from "./twisted-step";

const shifts: usize = memory.data(64, 16);
const counts: usize = memory.data(32, 16);
const next: usize = memory.data(64, 16);
const residual: usize = memory.data(64, 16);
const modes: usize = memory.data(32, 16);

export function stepBytes(chain: Chain): u64 {
  return chain.closed ? ringStepBytes(chain.n) : twistedBytes(chain.n);
}

export function levelsByIndex(
  chain: Chain, first: i32, count: i32, guesses: usize, widths: usize, values: usize, errors: usize,
): bool {
  const room = mark();
  const brackets = newBrackets(chain, first, count);
  if (guesses != 0 && !bracketGuesses(chain, brackets, guesses, widths)) return false;
  if (!bisect(chain, brackets, 3)) return false;
  const workspace = reserve(stepBytes(chain));
  if (!refine(chain, brackets, values, errors, workspace)) return false;
  if (!prove(chain, brackets, values, errors)) return false;
  release(room);
  return true;
}

/** Twisted steps for the isolated levels, eight at a time; the others take the middle of their narrow bracket. */
function refine(chain: Chain, brackets: Brackets, values: usize, errors: usize, workspace: usize): bool {
  const active = reserve(<u64>brackets.count * 4);
  let open = 0;
  for (let i = 0; i < brackets.count; i++) {
    put(values, i, 0.5 * (at(brackets.low, i) + at(brackets.high, i)));
    put(errors, i, 2 * chain.tolerance);
    if (at(brackets.high, i) - at(brackets.low, i) > chain.tolerance) putInt(active, open++, i);
  }
  for (let i = 0; i < 8; i++) putInt(modes, i, LONE);
  for (let round = 0; open > 0 && round < 60; round++) {
    let left = 0;
    for (let from = 0; from < open; from += 8) {
      const here = min(8, open - from);
      for (let k = 0; k < 8; k++) put(shifts, k, at(values, intAt(active, from + (k < here ? k : 0))));
      if (chain.closed) {
        // the step does not watch growth, so the bracket is narrowed by a count of its own
        ringStep(chain, round % FOLDS, shifts, modes, next, residual, 0, workspace);
        if (round > 0 && !chainCounts(chain, shifts, counts)) return false;
      } else {
        twistedStep(chain, shifts, next, residual, counts, 0, workspace);
      }
      for (let k = 0; k < here; k++) {
        const i = intAt(active, from + k);
        const x = at(values, i);
        if (!chain.closed || round > 0) learn(brackets, at(shifts, k), intAt(counts, k));
        const low = at(brackets.low, i);
        const high = at(brackets.high, i);
        const better = at(next, k);
        const inside = better > low - chain.tolerance && better < high + chain.tolerance; // false for NaN
        const done = inside && (Math.abs(better - x) <= chain.tolerance || at(residual, k) <= 0.5 * chain.tolerance);
        if (done) put(values, i, better);
        else if (high - low <= chain.tolerance) put(values, i, 0.5 * (low + high));
        else {
          put(values, i, inside && better > low && better < high ? better : 0.5 * (low + high));
          putInt(active, left++, i);
        }
      }
    }
    open = left;
  }
  return true;
}

/** Counts at value ± error for every level; what is not proved is bisected down to the tolerance. */
function prove(chain: Chain, brackets: Brackets, values: usize, errors: usize): bool {
  const n = brackets.count;
  for (let from = 0; from < n; from += 4) {
    const here = min(4, n - from);
    for (let k = 0; k < 4; k++) {
      const i = from + (k < here ? k : 0);
      put(shifts, 2 * k, at(values, i) - at(errors, i));
      put(shifts, 2 * k + 1, at(values, i) + at(errors, i));
    }
    if (!chainCounts(chain, shifts, counts)) return false;
    for (let k = 0; k < here; k++) {
      const i = from + k;
      const j = brackets.first + i;
      const below = intAt(counts, 2 * k);
      const above = intAt(counts, 2 * k + 1);
      learn(brackets, at(shifts, 2 * k), below);
      learn(brackets, at(shifts, 2 * k + 1), above);
      if (!(below <= j && j < above)) put(errors, i, -1);
    }
  }
  let missed = false;
  for (let i = 0; i < n; i++) if (at(errors, i) < 0) missed = true;
  if (!missed) return true;
  // no step converged to these: pure bisection, whose bracket is its own proof
  if (!bisect(chain, brackets, 400)) return false;
  for (let i = 0; i < n; i++) {
    if (at(errors, i) >= 0) continue;
    put(values, i, 0.5 * (at(brackets.low, i) + at(brackets.high, i)));
    put(errors, i, at(brackets.high, i) - at(brackets.low, i));
  }
  return true;
}
