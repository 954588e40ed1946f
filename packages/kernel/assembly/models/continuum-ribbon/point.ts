/**
 * Levels of one valley, spin and wave number by their signed index: on every grid, with slopes and shares, extrapolated.
 */
import { mark, release, reserve, reserveF64 } from "../../arena";
import { EPSILON } from "../../constants";
import { at, put } from "../../doubles";
import { fail } from "../../diagnostic";
import { NOT_CONVERGED, OK } from "../../status";
import { Chain } from "../../solvers/chain";
import { putInt } from "../../solvers/chain-brackets";
import { levelsByIndex, vectorLength } from "../../solvers/chain-levels";
import { clusterSize, levelVectors } from "../../solvers/chain-vectors";
import { clusterVelocities, valleyShare } from "./expectation";
import { extrapolate, limitError, limitHolds, limitValue } from "./extrapolate";
import { fillChain } from "./grid";
import { gridCount, velocity } from "./parameters";
import { chainAt, finestChain, gridAt, guessLevels, remember, Setting } from "./setting";

@unmanaged
export class Point {
  k: f64;
  /** Signed index of the first level solved (0 is the lowest conduction level), and how many. */
  first: i32;
  count: i32;
  /** Extrapolated levels, their errors, whether the estimate holds (i32). */
  values: usize;
  errors: usize;
  estimated: usize;
  velocities: usize;
  /** Share of valley K, averaged over clusters. */
  shares: usize;
  residuals: usize;
  /** Half width of the interval in which counts prove the level on the finest grid. */
  proofs: usize;
  cluster: usize;
  /** Level on the finest grid, and its vector. */
  fine: usize;
  vectors: usize;
  /** 1 where the level belongs to the request (i32). */
  chosen: usize;
  /** Where the list is complete. */
  low: f64;
  high: f64;
  cut: i32;
  wanted: i32;
  found: i32;
}

/** Energies closer than this count as equal: 8 n ε ‖H‖. */
@inline
export function tieBound(chain: Chain): f64 {
  return 8 * <f64>chain.n * EPSILON * chain.norm;
}

/** Solves levels first … first + count − 1 (signed) at k on all grids. A status. */
export function solveRange(setting: Setting, point: Point, k: f64, first: i32, count: i32): i32 {
  point.k = k;
  point.first = first;
  point.count = count;
  point.values = reserveF64(count);
  point.errors = reserveF64(count);
  point.estimated = reserve(<u64>count * 4);
  point.velocities = reserveF64(count);
  point.shares = reserveF64(count);
  point.residuals = reserveF64(count);
  point.proofs = reserveF64(count);
  point.cluster = reserve(<u64>count * 4);
  point.chosen = reserve(<u64>count * 4);
  const levels = reserveF64(3 * count); // per grid
  const slopes = reserveF64(3 * count);
  const guesses = reserveF64(count);
  const fresh = reserve(<u64>count * 4);
  const row = <usize>count << 3;
  for (let g = 0; g < gridCount; g++) {
    const chain = chainAt(setting, g);
    const room = mark();
    fillChain(chain, gridAt(setting, g), setting.valley, k);
    const here = levels + <usize>g * row;
    const vectors = reserveF64(<u64>count * vectorLength(chain));
    const guessed = guessLevels(setting, g, k, first, count, levels, guesses);
    if (!levelsByIndex(chain, first + gridAt(setting, g).half, count, guessed ? guesses : 0, here, point.proofs, vectors, fresh)) {
      return fail(NOT_CONVERGED, "Counting levels of a ring failed: its elimination grows from every site.");
    }
    if (!levelVectors(chain, count, here, point.proofs, vectors, fresh, point.residuals, point.cluster)) {
      return fail(NOT_CONVERGED, "The residual of a level stays above its bound.");
    }
    for (let i = 0; i < count; ) {
      const members = clusterSize(point.cluster, count, i);
      if (!clusterVelocities(chain, setting.valley, i, members, vectors, slopes + <usize>g * row)) {
        return fail(NOT_CONVERGED, "dE/dk of a cluster did not converge.");
      }
      i += members;
    }
    if (g == gridCount - 1) {
      point.vectors = vectors;
      point.fine = here;
      fillShares(setting, point, chain, vectors);
    } else {
      release(room);
    }
  }
  remember(setting, k, first, count, levels, slopes);
  combine(setting, point, levels, slopes);
  return OK;
}

function fillShares(setting: Setting, point: Point, chain: Chain, vectors: usize): void {
  const size = <usize>vectorLength(chain) << 3;
  for (let i = 0; i < point.count; ) {
    const members = clusterSize(point.cluster, point.count, i);
    let sum: f64 = 0;
    for (let m = i; m < i + members; m++) sum += valleyShare(chain, setting.row, vectors + <usize>m * size);
    for (let m = i; m < i + members; m++) put(point.shares, m, sum / <f64>members);
    i += members;
  }
}

/** Extrapolates levels and velocities, or takes the single grid. */
function combine(setting: Setting, point: Point, levels: usize, slopes: usize): void {
  const count = point.count;
  const row = <usize>count << 3;
  const chain = finestChain(setting);
  for (let i = 0; i < count; i++) {
    if (gridCount == 1) {
      put(point.values, i, at(levels, i));
      put(point.errors, i, 0);
      putInt(point.estimated, i, 0);
      put(point.velocities, i, at(slopes, i));
      continue;
    }
    const h1 = gridAt(setting, 0).h, h2 = gridAt(setting, 1).h, h3 = gridAt(setting, 2).h;
    extrapolate(at(levels, i), at(levels + row, i), at(levels + 2 * row, i), h1, h2, h3, 32 * chain.tolerance);
    put(point.values, i, limitValue);
    put(point.errors, i, limitError);
    putInt(point.estimated, i, limitHolds ? 1 : 2);
    extrapolate(at(slopes, i), at(slopes + row, i), at(slopes + 2 * row, i), h1, h2, h3, 1e-9 * velocity);
    put(point.velocities, i, limitValue);
  }
}
