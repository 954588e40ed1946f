/**
 * A chain: what the staggered grids of a ribbon give. Open = real symmetric tridiagonal; closed = the same with one
 * complex bond corner·e^{iθ} between the first and the last site (a twisted ring, an even number of sites).
 *
 * The model writes diagonal and bonds, calls `sealChain`, and every solver of this folder takes it from there.
 */
import { reserve, reserveF64, reserveZeroed } from "../arena";
import { EPSILON } from "../constants";
import { at, put } from "../doubles";
import { FOLD_BYTES, ringCounts } from "./ring-count";
import { pivotedGrowth, ringCountPivoted } from "./ring-count-pivoted";
import { sturmCounts } from "./sturm-count";

/** A ring can be folded at any site; a step whose elimination grows in one fold is tried in another. */
export const FOLDS: i32 = 4;

@unmanaged
export class Chain {
  /** Number of sites, and the largest number there is room for. */
  n: i32;
  capacity: i32;
  /** 1: a twisted ring. */
  closed: i32;
  /** Bit k: fold k has been made for the present matrix. */
  folded: i32;
  /** d[n], the diagonal. */
  diagonal: usize;
  /** b[n]: b[i] couples sites i−1 and i; b[0] is the corner of a ring, H[0][n−1] = b[0]·e^{iθ}, and 0 for an open chain. */
  bonds: usize;
  /** cos θ and sin θ. */
  cosine: f64;
  sine: f64;
  /** b[i]² of an open chain. */
  squares: usize;
  /** FOLDS × capacity/2 folded blocks of a ring (ring-count.ts). */
  folds: usize;
  /** Gershgorin's bound of ‖H‖, made by sealChain. */
  norm: f64;
  /** To this the solvers separate levels: 2 ε ‖H‖. */
  tolerance: f64;
}

/** Bytes of a chain with room for `capacity` sites. */
export function chainBytes(capacity: i32, closed: bool): u64 {
  const perSite: u64 = closed ? 16 + ((FOLDS as u64) * FOLD_BYTES) / 2 : 24;
  return <u64>(capacity + 16) * perSite + 512;
}

export function newChain(capacity: i32, closed: bool): Chain {
  const chain = changetype<Chain>(reserve(offsetof<Chain>()));
  chain.capacity = capacity;
  chain.n = capacity;
  chain.closed = closed ? 1 : 0;
  chain.diagonal = reserveF64(capacity);
  chain.bonds = reserveF64(capacity);
  chain.squares = closed ? 0 : reserveF64(capacity);
  // one block more: ring-step.ts reads one past the end
  chain.folds = closed ? reserveZeroed(((<u64>capacity / 2) * FOLDS + 1) * FOLD_BYTES) : 0;
  chain.cosine = 1;
  chain.sine = 0;
  chain.folded = 0;
  return chain;
}

/** Smallest square of a bond: keeps 0/0 out of the Sturm recursion. */
const BOND2_FLOOR: f64 = 1e-280;

/** Call once diagonal and bonds are written: norm, tolerance and the arrays of the counting loops. */
export function sealChain(chain: Chain): void {
  const n = chain.n;
  const d = chain.diagonal;
  const b = chain.bonds;
  if (!chain.closed) store<f64>(b, 0);
  let norm: f64 = 0;
  for (let i = 0; i < n; i++) {
    const next = i + 1 < n ? i + 1 : 0;
    const row = Math.abs(at(d, i)) + Math.abs(at(b, i)) + Math.abs(at(b, next));
    if (row > norm) norm = row;
  }
  chain.norm = norm;
  chain.tolerance = 2 * EPSILON * norm;
  chain.folded = 0;
  if (chain.closed) return;
  store<f64>(chain.squares, 0);
  for (let i = 1; i < n; i++) put(chain.squares, i, Math.max(at(b, i) * at(b, i), BOND2_FLOOR));
}

/** First site of fold k: golden-section steps around the ring. */
@inline
export function foldStart(chain: Chain, k: i32): i32 {
  return siteOf(chain, k);
}

function siteOf(chain: Chain, k: i32): i32 {
  const turn = 0.6180339887498949 * <f64>k;
  return <i32>((turn - Math.floor(turn)) * <f64>chain.n);
}

/** The blocks of fold k, made at first use. */
export function foldOf(chain: Chain, k: i32): usize {
  const n = chain.n;
  const blocks = chain.folds + <usize>k * <usize>(chain.capacity / 2) * FOLD_BYTES;
  if (chain.folded & (1 << k)) return blocks;
  chain.folded |= 1 << k;
  const start = foldStart(chain, k);
  let to = blocks;
  for (let i = 0; i < n / 2; i++, to += FOLD_BYTES) {
    const left = wrap(start + i, n);
    const right = wrap(start + n - 1 - i, n);
    const e = i > 0 ? at(chain.bonds, left) : 0;
    const f = i > 0 ? at(chain.bonds, wrap(right + 1, n)) : 0;
    store<f64>(to, at(chain.diagonal, left), 0);
    store<f64>(to, at(chain.diagonal, right), 8);
    store<f64>(to, e * e, 16);
    store<f64>(to, f * f, 24);
    store<f64>(to, e * f, 32);
    store<f64>(to, e, 40);
    store<f64>(to, f, 48);
    store<f64>(to, 0, 56);
  }
  return blocks;
}

@inline
export function wrap(i: i32, n: i32): i32 {
  return i < n ? i : i - n;
}

/** Corner and middle bond of fold k; the phase always sits on the corner (a gauge). */
export function foldCorner(chain: Chain, k: i32): f64 {
  return at(chain.bonds, foldStart(chain, k));
}
export function foldMiddle(chain: Chain, k: i32): f64 {
  return at(chain.bonds, wrap(foldStart(chain, k) + chain.n / 2, chain.n));
}

const growth: usize = memory.data(64, 16);

/**
 * Counts of levels below eight shifts. Where a ring's folded elimination grows beyond 8 n ‖H‖ (levels closer than
 * 8 n ε ‖H‖ count as equal) that shift is counted again with chosen pivots, from other sites if need be.
 * False: growth from every start.
 */
export function chainCounts(chain: Chain, shifts: usize, counts: usize): bool {
  if (!chain.closed) {
    sturmCounts(chain.n, chain.diagonal, chain.squares, shifts, counts);
    return true;
  }
  ringCounts(chain.n / 2, foldOf(chain, 0), foldCorner(chain, 0), foldMiddle(chain, 0), chain.cosine, chain.sine, shifts, counts, growth);
  const limit = 8 * <f64>chain.n * chain.norm;
  for (let i = 0; i < 8; i++) {
    if (at(growth, i) <= limit) continue;
    let trusted = false;
    for (let k = 0; k < 16 && !trusted; k++) {
      store<i32>(counts + (<usize>i << 2), ringCountPivoted(chain, at(shifts, i), siteOf(chain, k)));
      trusted = pivotedGrowth <= limit;
    }
    if (!trusted) return false;
  }
  return true;
}
