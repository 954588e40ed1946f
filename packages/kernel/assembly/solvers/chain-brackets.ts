/**
 * Brackets of levels by bisection on counts: level j lies in [low, high) because #(< low) ≤ j < #(< high).
 *
 * Source    W. Barth, R. S. Martin, J. H. Wilkinson, Numer. Math. 9 (1967) 386–393 (bisection by index); eight shifts
 *           per pass are spread over the distinct brackets.
 * Input     chain; first, count: indices first … first+count−1 (0 = lowest of all).
 * Output    a Brackets whose every level is isolated and has been halved three times since, or is as narrow as
 *           chain.tolerance (levels closer than that share a bracket).
 * Cost      one pass of eight counts per eight distinct brackets and halving.
 * Fails     false when a ring's elimination grows from every start.
 */
import { mark, release, reserve, reserveF64 } from "../arena";
import { Chain, chainCounts } from "./chain";
import { at, put } from "../doubles";

@unmanaged
export class Brackets {
  first: i32;
  count: i32;
  /** Per level: lower and upper end, counts there (i32), halvings since isolation (i32). */
  low: usize;
  high: usize;
  below: usize;
  above: usize;
  halvings: usize;
}

const shifts: usize = memory.data(64, 16);
const counts: usize = memory.data(32, 16);

@inline
export function intAt(p: usize, i: i32): i32 {
  return load<i32>(p + (<usize>i << 2));
}
@inline
export function putInt(p: usize, i: i32, value: i32): void {
  store<i32>(p + (<usize>i << 2), value);
}

export function newBrackets(chain: Chain, first: i32, count: i32): Brackets {
  const brackets = changetype<Brackets>(reserve(offsetof<Brackets>()));
  brackets.first = first;
  brackets.count = count;
  brackets.low = reserveF64(count);
  brackets.high = reserveF64(count);
  brackets.below = reserve(<u64>count * 4);
  brackets.above = reserve(<u64>count * 4);
  brackets.halvings = reserve(<u64>count * 4);
  const end = chain.norm + chain.tolerance; // Gershgorin: every level lies inside
  for (let i = 0; i < count; i++) {
    put(brackets.low, i, -end);
    put(brackets.high, i, end);
    putInt(brackets.below, i, 0);
    putInt(brackets.above, i, chain.n);
    putInt(brackets.halvings, i, 0);
  }
  return brackets;
}

/** Takes over that `below` levels lie under x. */
export function learn(brackets: Brackets, x: f64, below: i32): void {
  for (let i = 0; i < brackets.count; i++) {
    if (below <= brackets.first + i) {
      if (x > at(brackets.low, i)) {
        put(brackets.low, i, x);
        putInt(brackets.below, i, below);
      }
    } else if (x < at(brackets.high, i)) {
      put(brackets.high, i, x);
      putInt(brackets.above, i, below);
    }
  }
}

/** Counts at `used` shifts of the list and learns them. */
function count(chain: Chain, brackets: Brackets, used: i32): bool {
  for (let i = used; i < 8; i++) put(shifts, i, at(shifts, 0));
  if (!chainCounts(chain, shifts, counts)) return false;
  for (let i = 0; i < used; i++) learn(brackets, at(shifts, i), intAt(counts, i));
  return true;
}

@inline
export function isIsolated(brackets: Brackets, i: i32): bool {
  return intAt(brackets.above, i) - intAt(brackets.below, i) == 1;
}

@inline
function width(brackets: Brackets, i: i32): f64 {
  return at(brackets.high, i) - at(brackets.low, i);
}

/** Halves until every level is isolated (and `extra` times more) or narrower than the tolerance. */
export function bisect(chain: Chain, brackets: Brackets, extra: i32): bool {
  const room = mark();
  const pending = reserve(<u64>brackets.count * 4);
  for (let pass = 0; pass < 4000; pass++) {
    // distinct brackets that are not ready yet: levels in one bracket are neighbours
    let distinct = 0;
    for (let i = 0; i < brackets.count; i++) {
      if (width(brackets, i) <= chain.tolerance) continue;
      if (isIsolated(brackets, i) && intAt(brackets.halvings, i) >= extra) continue;
      if (distinct > 0 && at(brackets.low, intAt(pending, distinct - 1)) == at(brackets.low, i)) continue;
      putInt(pending, distinct++, i);
    }
    if (distinct == 0) {
      release(room);
      return true;
    }
    for (let from = 0; from < distinct; from += 8) {
      const here = min(8, distinct - from);
      const each = 8 / here; // interior points per bracket
      let used = 0;
      for (let k = 0; k < here; k++) {
        const i = intAt(pending, from + k);
        const low = at(brackets.low, i);
        const wide = width(brackets, i);
        if (isIsolated(brackets, i)) putInt(brackets.halvings, i, intAt(brackets.halvings, i) + (each > 1 ? 2 : 1));
        for (let p = 1; p <= each; p++) put(shifts, used++, low + (wide * <f64>p) / <f64>(each + 1));
      }
      if (!count(chain, brackets, used)) {
        release(room);
        return false;
      }
    }
  }
  release(room);
  return false;
}
