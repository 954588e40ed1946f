/**
 * Unit vectors of consecutive levels of a chain, with their measured residuals and clusters.
 *
 * Levels closer than 1000 residual bounds form a cluster: their single vectors are not determined, only the space.
 * Lone levels keep the vector of their last step or take one; a pair of a ring takes both vectors of one twisted block; every other cluster is
 * made by inverse iteration with re-orthogonalisation.
 *
 * Source    twisted-step.ts, ring-step.ts; clusters as in G. Peters, J. H. Wilkinson, Handbook for Automatic
 *           Computation II (1971) 418–439, inverse iteration with Gram–Schmidt.
 * Input     a sealed chain; values[count], errors[count], vectors[count] and fresh[count] from levelsByIndex.
 * Output    vectors[count]: n doubles each (open) or 2n (ring, re and im per site), orthonormal inside a cluster;
 *           residuals[count] = ‖H z − λ z‖ as measured; cluster[count] i32: index of the first level of its cluster.
 * Accuracy  residual a few ε‖H‖ for lone levels; within a cluster at most its width.
 * Cost      one step per eight lone levels; 3 solves per level of a cluster.
 * Fails     false when a residual stays above 10⁴ tolerances and the cluster's width.
 */
import { mark, release, reserve } from "../arena";
import { addScaled, dot, fillFixed, normalise, projectOut } from "../linalg/dense-vector";
import { chainResidual } from "./chain-apply";
import { intAt, putInt } from "./chain-brackets";
import { Chain, FOLDS } from "./chain";
import { at, put } from "../doubles";
import { stepBytes, vectorLength } from "./chain-levels";
import { LONE, PAIR_FIRST, PAIR_SECOND, ringStep } from "./ring-step";
import { factorRing, ringSolveBytes, solveRing } from "./ring-solve";
import { factorTridiagonal, solveTridiagonal, tridiagonalSolveBytes } from "./tridiagonal-solve";
import { twistedStep } from "./twisted-step";

const shifts: usize = memory.data(64, 16);
const counts: usize = memory.data(32, 16);
const next: usize = memory.data(64, 16);
const residual: usize = memory.data(64, 16);
const modes: usize = memory.data(32, 16);
const targets: usize = memory.data(32, 16);

/** Residuals up to this many tolerances are good: a few hundred roundings of the largest element. */
const ACCEPTED: f64 = 64;

/** First level of each level's cluster: neighbours closer than 1000 bounds of their errors. */
export function clusterLevels(count: i32, values: usize, errors: usize, cluster: usize): void {
  for (let i = 0; i < count; i++) {
    const near = i > 0 && at(values, i) - at(values, i - 1) < 1000 * Math.max(at(errors, i), at(errors, i - 1));
    putInt(cluster, i, near ? intAt(cluster, i - 1) : i);
  }
}

export function levelVectors(
  chain: Chain, count: i32, values: usize, errors: usize, vectors: usize, fresh: usize, residuals: usize, cluster: usize,
): bool {
  const room = mark();
  clusterLevels(count, values, errors, cluster);
  const workspace = reserve(stepBytes(chain));
  const size = <usize>vectorLength(chain) << 3;
  const group = reserve(64);
  let waiting = 0;
  for (let i = 0; i < count; ) {
    const members = clusterSize(cluster, count, i);
    if (members == 1 && intAt(fresh, i) != 0) {
      i++;
      continue;
    }
    if (members == 1 || (chain.closed && members == 2)) {
      if (waiting + members > 8) {
        step(chain, 0, group, waiting, values, cluster, count, vectors, workspace);
        waiting = 0;
      }
      for (let k = 0; k < members; k++) putInt(group, waiting++, i + k);
    } else {
      iterate(chain, i, members, values, vectors, false);
    }
    i += members;
  }
  if (waiting > 0) step(chain, 0, group, waiting, values, cluster, count, vectors, workspace);
  if (chain.closed) refold(chain, group, values, cluster, count, vectors, residuals, workspace);
  for (let i = 0; i < count; ) {
    const members = clusterSize(cluster, count, i);
    if (!measure(chain, i, members, values, vectors, residuals)) return false;
    i += members;
  }
  orthogonaliseNear(chain, count, values, vectors);
  release(room);
  return true;
}

export function clusterSize(cluster: usize, count: i32, first: i32): i32 {
  let members = 1;
  while (first + members < count && intAt(cluster, first + members) == first) members++;
  return members;
}

/** Twisted steps of up to eight levels. */
function step(
  chain: Chain, fold: i32, group: usize, used: i32, values: usize, cluster: usize, count: i32, vectors: usize, workspace: usize,
): void {
  const size = <usize>vectorLength(chain) << 3;
  for (let lane = 0; lane < 8; lane++) {
    const i = intAt(group, lane < used ? lane : 0);
    const first = intAt(cluster, i);
    const pair = clusterSize(cluster, count, first) == 2;
    put(shifts, lane, at(values, i));
    putInt(modes, lane, pair ? (i == first ? PAIR_FIRST : PAIR_SECOND) : LONE);
    putInt(targets, lane, lane < used ? <i32>(vectors + <usize>i * size) : 0);
    // both vectors of a pair come from one shift, or they need not be independent
    if (pair) put(shifts, lane, 0.5 * (at(values, first) + at(values, first + 1)));
  }
  if (chain.closed) ringStep(chain, fold, used, shifts, modes, next, residual, targets, workspace);
  else twistedStep(chain, shifts, next, residual, counts, targets, workspace);
}

function orthogonalisePair(chain: Chain, vector: usize, size: usize): void {
  projectOut(chain.n, vector, vector + size);
  normalise(2 * chain.n, vector + size);
}

/**
 * Ring vectors whose residual shows a grown elimination are taken again from other folds, eight at a time, which is
 * much cheaper than a solve each. Makes every pair orthonormal on the way.
 */
function refold(
  chain: Chain, group: usize, values: usize, cluster: usize, count: i32, vectors: usize, residuals: usize, workspace: usize,
): void {
  const size = <usize>vectorLength(chain) << 3;
  for (let i = 0; i < count; i += clusterSize(cluster, count, i)) {
    if (clusterSize(cluster, count, i) == 2) orthogonalisePair(chain, vectors + <usize>i * size, size);
  }
  for (let fold = 1; fold < FOLDS; fold++) {
    let waiting = 0;
    for (let i = 0; i < count; ) {
      const members = clusterSize(cluster, count, i);
      let worst: f64 = 0;
      for (let k = i; k < i + members; k++) {
        // known since the last fold unless its vector was taken again
        if (fold == 1 || at(residuals, k) < 0) put(residuals, k, chainResidual(chain, at(values, k), vectors + <usize>k * size));
        if (!(at(residuals, k) <= worst)) worst = at(residuals, k); // keeps a NaN
      }
      const width = at(values, i + members - 1) - at(values, i);
      if (members <= 2 && !(worst <= ACCEPTED * chain.tolerance + width) && waiting + members <= 8) {
        for (let k = 0; k < members; k++) {
          put(residuals, i + k, -1);
          putInt(group, waiting++, i + k);
        }
      }
      i += members;
    }
    if (waiting == 0) return;
    step(chain, fold, group, waiting, values, cluster, count, vectors, workspace);
    for (let k = 0; k + 1 < waiting; k++) {
      const i = intAt(group, k);
      if (intAt(group, k + 1) == i + 1 && intAt(cluster, i + 1) == i) orthogonalisePair(chain, vectors + <usize>i * size, size);
    }
  }
}

/** Residuals of one cluster; where they are too large, one more inverse step by LU, then inverse iteration anew. */
function measure(
  chain: Chain, first: i32, members: i32, values: usize, vectors: usize, residuals: usize,
): bool {
  const size = <usize>vectorLength(chain) << 3;
  const last = first + members - 1;
  const width = at(values, last) - at(values, first);
  let worst: f64 = 0;
  for (let attempt = 0; attempt < 3; attempt++) {
    if (attempt > 0) iterate(chain, first, members, values, vectors, attempt == 1 && worst < 1e-3 * chain.norm);
    worst = 0;
    for (let i = first; i <= last; i++) {
      // refold has measured a ring's vectors already, but for those of its last fold
      const known = chain.closed && attempt == 0 && at(residuals, i) >= 0;
      const r = known ? at(residuals, i) : chainResidual(chain, at(values, i), vectors + <usize>i * size);
      put(residuals, i, r);
      if (!(r <= worst)) worst = r; // keeps a NaN
    }
    if (worst <= ACCEPTED * chain.tolerance + width) return true;
  }
  return worst <= 1e4 * chain.tolerance + width;
}

/** Levels too close for their vectors to be orthogonal to rounding, though no cluster: Gram–Schmidt, twice. */
function orthogonaliseNear(chain: Chain, count: i32, values: usize, vectors: usize): void {
  const length = vectorLength(chain);
  const size = <usize>length << 3;
  let first = 0;
  for (let i = 1; i < count; i++) {
    if (at(values, i) - at(values, i - 1) > 1e8 * chain.tolerance) first = i;
    const z = vectors + <usize>i * size;
    for (let twice = 0; twice < 2 && first < i; twice++) {
      for (let before = first; before < i; before++) project(chain, length, vectors + <usize>before * size, z);
      normalise(length, z);
    }
  }
}

/** z −= ⟨y|z⟩ y. */
@inline
function project(chain: Chain, length: i32, y: usize, z: usize): void {
  if (chain.closed) projectOut(chain.n, y, z);
  else addScaled(length, -dot(length, y, z), y, z);
}

/** Inverse iteration for the levels of one cluster, from what there is or anew, each orthogonal to those before it. */
function iterate(chain: Chain, first: i32, members: i32, values: usize, vectors: usize, improve: bool): void {
  const room = mark();
  const length = vectorLength(chain);
  const size = <usize>length << 3;
  const workspace = reserve(chain.closed ? ringSolveBytes(chain.n) : tridiagonalSolveBytes(chain.n));
  for (let k = 0; k < members; k++) {
    const z = vectors + <usize>(first + k) * size;
    // Off the levels of a cluster by a few roundings, each by its own: exactly on one of them its vector would drown
    // the others of the space (zero modes at opposite edges are closer than any double can tell).
    const x = at(values, first + k) + (members > 1 ? <f64>(k + 1) * chain.tolerance : 0);
    const inner = mark(); // the matrix of a ring
    if (chain.closed) factorRing(chain, x, workspace);
    else factorTridiagonal(chain, x, workspace);
    if (!improve) fillFixed(length, <u64>(k + 1), z);
    const passes = improve ? 1 : 4;
    for (let pass = 0; pass < passes; pass++) {
      normalise(length, z);
      if (chain.closed) solveRing(chain, workspace, z);
      else solveTridiagonal(chain.n, workspace, z);
      normalise(length, z);
      for (let twice = 0; twice < 2; twice++) {
        for (let before = 0; before < k; before++) {
          project(chain, length, vectors + <usize>(first + before) * size, z);
        }
        normalise(length, z);
      }
    }
    release(inner);
  }
  release(room);
}
