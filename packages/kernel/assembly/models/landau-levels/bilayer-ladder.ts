/**
 * Landau levels of the Bernal bilayer with v₃ from the ladder matrix.
 *
 * Blocks −1 … N of bilayer-block.ts, every component with its own cut-off (equal ones leave orphaned top states near
 * zero). v₃ joins block n to n + 3 only, so the matrix falls into three chains n ≡ 2, 0, 1 (mod 3); in the order of a
 * chain each is pentadiagonal (v₄ ≠ 0) or tridiagonal already. Levels are found by counting over all three.
 *
 * Source    E. McCann, M. Koshino, Rep. Prog. Phys. 76, 056503 (2013) for H; cut-off by component, chains: own derivation.
 * Output    the 2(maxIndex + 1) levels around half filling, and for each the half width of its proved interval.
 * Accuracy  that of the cut-off N, which the caller measures with 2N.
 * Cost      three chains of (4N + 4)/3 sites; with v₄ also (4N/3)² rotations in all.
 * Fails     false when the counts do not close (never seen on open chains).
 */
import { reserveF64 } from "../../arena";
import { at, put } from "../../doubles";
import { heapSort } from "../../linalg/heap-sort";
import { pentadiagonalToTridiagonal } from "../../solvers/pentadiagonal-to-tridiagonal";
import { Chain, chainCounts, newChain, sealChain } from "../../solvers/chain";
import { blockDiagonal, blockNext, blockSecond, blockSize, blockToNext } from "./bilayer-block";
import { ladderSquare } from "./monolayer";
import { maxIndex, v4Ratio } from "./parameters";
import { provedLevels } from "./proved-levels";

const shifts: usize = memory.data(64, 16);
const counts: usize = memory.data(32, 16);
const totals: usize = memory.data(32, 16);

/** Chain of the blocks first, first + 3, … ≤ last. */
function buildChain(first: i32, last: i32, sign: f64, square: f64): Chain {
  let n = 0;
  for (let block = first; block <= last; block += 3) n += blockSize(block);
  const chain = newChain(n, false);
  const second = reserveF64(n);
  memory.fill(chain.bonds, 0, <usize>n << 3);
  memory.fill(second, 0, <usize>n << 3);
  let i = 0;
  for (let block = first; block <= last; block += 3) {
    const size = blockSize(block);
    for (let j = 0; j < size; j++, i++) {
      const c = j + 4 - size;
      put(chain.diagonal, i, blockDiagonal(c, sign));
      if (j > 0) put(chain.bonds, i, blockNext(c - 1, block, square));
      else if (i > 0) put(chain.bonds, i, blockToNext(block - 3, square));
      if (j > 1) put(second, i, blockSecond(c - 2, block, square));
    }
  }
  if (v4Ratio != 0) pentadiagonalToTridiagonal(n, chain.diagonal, chain.bonds, second);
  sealChain(chain);
  return chain;
}

/** Levels below eight shifts over the three chains. */
function countAll(a: Chain, b: Chain, c: Chain): void {
  memory.fill(totals, 0, 32);
  for (let k = 0; k < 3; k++) {
    chainCounts(k == 0 ? a : k == 1 ? b : c, shifts, counts);
    for (let i: usize = 0; i < 32; i += 4) store<i32>(totals + i, load<i32>(totals + i) + load<i32>(counts + i));
  }
}

/** An energy with at most `wanted` levels below it (isLower), or at least `wanted` (else): exact unless a cluster forbids. */
function energyBelow(a: Chain, b: Chain, c: Chain, wanted: i32, isLower: bool): f64 {
  const norm = Math.max(a.norm, Math.max(b.norm, c.norm)) * 1.01;
  let low = -norm;
  let high = norm;
  while (high - low > a.tolerance) {
    for (let i = 0; i < 8; i++) put(shifts, i, low + ((high - low) * <f64>(i + 1)) / 9);
    countAll(a, b, c);
    let from = low;
    for (let i = 0; i < 8; i++) {
      const total = load<i32>(totals + (<usize>i << 2));
      if (total == wanted) return at(shifts, i);
      if (total > wanted) {
        high = at(shifts, i);
        break;
      }
      from = at(shifts, i);
    }
    low = from;
  }
  return isLower ? low : high;
}

export function bilayerLadder(b: f64, tau: f64, size: i32, values: usize, errors: usize): bool {
  const sign = b > 0 ? tau : -tau;
  const square = ladderSquare(b);
  const one = buildChain(-1, size, sign, square);
  const two = buildChain(0, size, sign, square);
  const three = buildChain(1, size, sign, square);
  const half = (one.n + two.n + three.n) >> 1;
  const wanted = maxIndex + 1;
  const low = energyBelow(one, two, three, half - wanted, true);
  const high = energyBelow(one, two, three, half + wanted, false);
  for (let i = 0; i < 8; i++) put(shifts, i, i == 0 ? low : high);
  countAll(one, two, three);
  const below = load<i32>(totals);
  const found = load<i32>(totals, 4) - below;
  const all = reserveF64(found);
  const widths = reserveF64(found);
  let filled = 0;
  let widest = 0.0;
  for (let k = 0; k < 3; k++) {
    const chain = k == 0 ? one : k == 1 ? two : three;
    chainCounts(chain, shifts, counts);
    const first = load<i32>(counts);
    const count = load<i32>(counts, 4) - first;
    if (count == 0) continue;
    if (!provedLevels(chain, first, count, all + (<usize>filled << 3), widths)) return false;
    for (let i = 0; i < count; i++) widest = Math.max(widest, at(widths, i));
    filled += count;
  }
  heapSort(all, found);
  const skip = half - wanted - below;
  for (let i = 0; i < 2 * wanted; i++) {
    put(values, i, at(all, skip + i));
    put(errors, i, widest);
  }
  return true;
}
