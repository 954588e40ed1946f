/** One level at one place of the axis: row (index on the axis) and place in the flat lists. */
export interface LevelRef {
  row: number;
  at: number;
}

export interface LevelRows {
  /** Axis value of every row, increasing. */
  axis: ArrayLike<number>;
  energies: ArrayLike<number>;
  /** dE/dk of every level. */
  slopes: ArrayLike<number>;
  /** First and one-past-last place of a row; energies ascend inside a row. */
  bounds(row: number): readonly [number, number];
}

/**
 * Joins levels of neighbouring rows into lines by their slopes, never by their order: a crossing must not be drawn as
 * an anticrossing. The trapezoid E_a + (v_a + v_b)Δk/2 predicts the partner, and a bend costs a quarter of its height
 * (at a symmetric crossing the trapezoid alone cannot tell). Two levels belong together when each is the other's best
 * and no visibly different one predicts nearly as well. What is left stays alone and is drawn as dots.
 */
export function joinLevels(rows: LevelRows): LevelRef[][] {
  const { axis, energies, slopes } = rows;
  const lines: LevelRef[][] = [];
  let open = new Map<number, LevelRef[]>();
  for (let row = 0; row < axis.length; row++) {
    const [from, to] = rows.bounds(row);
    const next = new Map<number, LevelRef[]>();
    const partner = row > 0 ? partners(rows, row - 1, row) : new Map<number, number>();
    const back = new Map<number, number>();
    for (const [a, b] of partner) back.set(b, a);
    for (let at = from; at < to; at++) {
      if (Number.isNaN(energies[at]) || Number.isNaN(slopes[at])) continue;
      const before = back.get(at);
      const line = (before === undefined ? undefined : open.get(before)) ?? [];
      if (line.length === 0) lines.push(line);
      line.push({ row, at });
      next.set(at, line);
    }
    open = next;
  }
  return lines;
}

function partners(rows: LevelRows, rowA: number, rowB: number): Map<number, number> {
  const step = (rows.axis[rowB] as number) - (rows.axis[rowA] as number);
  const forward = bestOf(rows, rows.bounds(rowA), rows.bounds(rowB), step);
  const backward = bestOf(rows, rows.bounds(rowB), rows.bounds(rowA), -step);
  const joined = new Map<number, number>();
  for (const [a, b] of forward) if (backward.get(b) === a) joined.set(a, b);
  return joined;
}

/** For every level of one row its best partner in the other; levels in doubt have none. */
function bestOf(
  { energies, slopes }: LevelRows,
  [fromA, toA]: readonly [number, number],
  [fromB, toB]: readonly [number, number],
  step: number,
): Map<number, number> {
  const best = new Map<number, number>();
  const taken = new Set<number>();
  for (let a = fromA; a < toA; a++) {
    const ea = energies[a] as number;
    const va = slopes[a] as number;
    let first = -1;
    let miss = Number.POSITIVE_INFINITY;
    let rival = Number.POSITIVE_INFINITY;
    let rivalAt = -1;
    for (let b = nearStart(energies, fromB, toB, ea + va * step); b < toB; b++) {
      const eb = energies[b] as number;
      const vb = slopes[b] as number;
      const error = Math.abs(eb - ea - ((va + vb) / 2) * step) + Math.abs((vb - va) * step) / 4;
      // equal levels (a degenerate pair): the ones still free come first
      const tied = error < miss + 1e-9 && taken.has(first) && !taken.has(b);
      if (error < miss - 1e-9 || tied) {
        if (!tied) [rival, rivalAt] = [miss, first];
        [miss, first] = [Math.min(error, miss), b];
      } else if (error < rival) [rival, rivalAt] = [error, b];
      if (eb > ea + Math.abs(va * step) * 2 + 0.2 && b > first + 4) break;
    }
    if (first < 0) continue;
    const vFirst = slopes[first] as number;
    const trapezoid = Math.abs((energies[first] as number) - ea - ((va + vFirst) / 2) * step);
    const sameLine =
      rivalAt >= 0 &&
      Math.abs((energies[rivalAt] as number) - (energies[first] as number)) < 1e-6 &&
      Math.abs((slopes[rivalAt] as number) - (slopes[first] as number)) < 1e-4;
    const clear = sameLine || miss < 0.6 * rival;
    const sane = trapezoid <= 2e-4 + 0.35 * Math.max(Math.abs(va * step), Math.abs(vFirst * step));
    if (clear && sane) {
      best.set(a, first);
      taken.add(first);
    }
  }
  return best;
}

/** A place safely below the predicted energy in an ascending row. */
function nearStart(energies: ArrayLike<number>, from: number, to: number, energy: number): number {
  let low = from;
  let high = to;
  while (low < high) {
    const middle = (low + high) >> 1;
    if ((energies[middle] as number) < energy) low = middle + 1;
    else high = middle;
  }
  return Math.max(from, low - 8);
}
