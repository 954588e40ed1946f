/**
 * Levels of a chain by index, with unit vectors: brackets by bisection (or guesses), refined by twisted
 * Rayleigh-quotient steps, and each proved by counts on both sides of the value returned.
 *
 * Guesses are believed first: steps run from them without brackets, and only the proof decides. Where it fails, all
 * levels are bracketed by bisection and refined inside their brackets. The vector of a lone level is that of its last
 * step; pairs of a ring, clusters and levels that only bisection reached get theirs in chain-vectors.ts.
 *
 * Source    chain-brackets.ts, twisted-step.ts, ring-step.ts; safeguarding as in R. P. Brent, Algorithms for
 *           Minimization without Derivatives (1973) ch. 4 (a step that leaves the bracket is replaced by halving).
 * Input     a sealed chain; first, count ≥ 1; guesses or 0; vectors: room for count vectors (chain-vectors.ts).
 * Output    values[count] ascending, errors[count] (half width of the proved interval of each value), fresh[count] i32
 *           (1: the vector belongs to the value).
 * Accuracy  #(< value − error) ≤ j < #(< value + error) for every level j, error of a few ε‖H‖.
 * Cost      2 steps and 2 counts per level from good guesses, 2 steps and 12 counts more from none.
 * Fails     false when a ring's elimination grows from every start.
 */
import { mark, release, reserve } from "../arena";
import { at, put } from "../doubles";
import { bisect, Brackets, intAt, learn, newBrackets, putInt } from "./chain-brackets";
import { Chain, chainCounts, FOLDS } from "./chain";
import { LONE, ringStep, ringStepBytes } from "./ring-step";
import { twistedBytes, twistedStep } from "./twisted-step";

const shifts: usize = memory.data(64, 16);
const counts: usize = memory.data(32, 16);
const next: usize = memory.data(64, 16);
const residual: usize = memory.data(64, 16);
const modes: usize = memory.data(32, 16);
const targets: usize = memory.data(32, 16);

export function stepBytes(chain: Chain): u64 {
  return chain.closed ? ringStepBytes(chain.n) : twistedBytes(chain.n);
}

/** Doubles of one vector. */
@inline
export function vectorLength(chain: Chain): i32 {
  return chain.closed ? 2 * chain.n : chain.n;
}

export function levelsByIndex(
  chain: Chain, first: i32, count: i32, guesses: usize, values: usize, errors: usize, vectors: usize, fresh: usize,
): bool {
  const room = mark();
  const workspace = reserve(stepBytes(chain));
  const active = reserve(<u64>count * 4);
  const brackets = newBrackets(chain, first, count);
  if (guesses != 0) {
    memory.copy(values, guesses, <usize>count << 3);
    if (follow(chain, count, values, errors, vectors, fresh, active, workspace)) {
      if (!prove(chain, brackets, values, errors)) return false;
      if (allProved(count, errors)) {
        release(room);
        return true;
      }
    }
  }
  if (!bisect(chain, brackets, 3)) return false;
  if (!refine(chain, brackets, values, errors, vectors, fresh, active, workspace)) return false;
  if (!prove(chain, brackets, values, errors)) return false;
  if (!allProved(count, errors) && !settle(chain, brackets, values, errors, fresh)) return false;
  release(room);
  return true;
}

/** Levels alone, without vectors or guesses: as levelsByIndex. */
export function levelValues(chain: Chain, first: i32, count: i32, values: usize, errors: usize): bool {
  const room = mark();
  const done = levelsByIndex(chain, first, count, 0, values, errors, 0, reserve(<u64>count * 4));
  release(room);
  return done;
}

/** One step of the levels active[from …]; the shifts are their values. */
function step(
  chain: Chain, fold: i32, active: usize, from: i32, here: i32, values: usize, vectors: usize, workspace: usize,
): void {
  const size = <usize>vectorLength(chain) << 3;
  for (let k = 0; k < 8; k++) {
    const i = intAt(active, from + (k < here ? k : 0));
    put(shifts, k, at(values, i));
    putInt(modes, k, LONE);
    putInt(targets, k, vectors != 0 && k < here ? <i32>(vectors + <usize>i * size) : 0);
  }
  if (chain.closed) ringStep(chain, fold, here, shifts, modes, next, residual, targets, workspace);
  else twistedStep(chain, shifts, next, residual, counts, targets, workspace);
}

/** Steps from guesses until they stand still, at most five; false when one does not or they lose their order. */
function follow(
  chain: Chain, count: i32, values: usize, errors: usize, vectors: usize, fresh: usize, active: usize, workspace: usize,
): bool {
  let open = count;
  for (let i = 0; i < count; i++) {
    putInt(active, i, i);
    putInt(fresh, i, 1);
    put(errors, i, 2 * chain.tolerance);
  }
  for (let round = 0; open > 0; round++) {
    if (round == 5) return false;
    let left = 0;
    for (let from = 0; from < open; from += 8) {
      const here = min(8, open - from);
      // the first step moves to the level, and only vectors from there are any good
      step(chain, round & 1, active, from, here, values, round == 0 ? 0 : vectors, workspace);
      for (let k = 0; k < here; k++) {
        const i = intAt(active, from + k);
        const moved = Math.abs(at(next, k) - at(values, i));
        if (!(moved < 0.1 * chain.norm)) return false; // also for NaN
        put(values, i, Math.abs(at(next, k)) < 1e-100 ? 0 : at(next, k));
        if (round == 0 || moved > 8 * chain.tolerance) putInt(active, left++, i);
      }
    }
    open = left;
  }
  for (let i = 1; i < count; i++) if (at(values, i) < at(values, i - 1) - 4 * chain.tolerance) return false;
  return true;
}

/** Twisted steps for the isolated levels inside their brackets; the others take the middle of their narrow bracket. */
function refine(
  chain: Chain, brackets: Brackets, values: usize, errors: usize, vectors: usize, fresh: usize, active: usize, workspace: usize,
): bool {
  let open = 0;
  for (let i = 0; i < brackets.count; i++) {
    put(values, i, 0.5 * (at(brackets.low, i) + at(brackets.high, i)));
    put(errors, i, 2 * chain.tolerance);
    putInt(fresh, i, 0);
    if (at(brackets.high, i) - at(brackets.low, i) > chain.tolerance) putInt(active, open++, i);
  }
  for (let round = 0; open > 0 && round < 60; round++) {
    let left = 0;
    for (let from = 0; from < open; from += 8) {
      const here = min(8, open - from);
      step(chain, round % FOLDS, active, from, here, values, vectors, workspace);
      // a ring's step does not watch growth: its bracket is narrowed by a count of its own
      if (chain.closed && round > 0 && !chainCounts(chain, shifts, counts)) return false;
      for (let k = 0; k < here; k++) {
        const i = intAt(active, from + k);
        const x = at(values, i);
        if (!chain.closed || round > 0) learn(brackets, x, intAt(counts, k));
        const low = at(brackets.low, i);
        const high = at(brackets.high, i);
        const better = at(next, k);
        const inside = better > low - chain.tolerance && better < high + chain.tolerance; // false for NaN
        if (inside && Math.abs(better - x) <= 8 * chain.tolerance) {
          // a zero mode of a zero diagonal: the pivot floor leaves 1e-200
          put(values, i, Math.abs(better) < 1e-100 ? 0 : better);
          putInt(fresh, i, 1);
        } else if (high - low <= chain.tolerance) {
          put(values, i, 0.5 * (low + high));
        } else {
          put(values, i, inside && better > low && better < high ? better : 0.5 * (low + high));
          putInt(active, left++, i);
        }
      }
    }
    open = left;
  }
  return true;
}

/** Counts at value ± error for every level; what is not proved gets a negative error. */
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
  return true;
}

function allProved(count: i32, errors: usize): bool {
  for (let i = 0; i < count; i++) if (at(errors, i) < 0) return false;
  return true;
}

/** No step converged to the levels left: pure bisection, whose bracket is its own proof. */
function settle(chain: Chain, brackets: Brackets, values: usize, errors: usize, fresh: usize): bool {
  if (!bisect(chain, brackets, 400)) return false;
  for (let i = 0; i < brackets.count; i++) {
    if (at(errors, i) >= 0) continue;
    put(values, i, 0.5 * (at(brackets.low, i) + at(brackets.high, i)));
    // counts within a few ε‖H‖ of a level may cross: the bracket is at least that wide
    put(errors, i, Math.max(at(brackets.high, i) - at(brackets.low, i), 2 * chain.tolerance));
    putInt(fresh, i, 0);
  }
  return true;
}
