import type { Plot } from '@nightcone/drawing';

/** What the cross-hair is on: a value with its error, words that name it, and numbers that go with it. */
export interface Readout {
  /** '226.406(4) meV' */
  value: string;
  /** 'valley K, level n = 2' */
  description: string;
  rows: { symbol?: string; label: string; value: string }[];
  /** Height of the cross-hair in px from the top of the plot, for the margin beside it. */
  top: number;
  /** Job behind the place, on plots over a sweep. */
  point?: number;
}

/** Places that the cross-hair jumps to, in data units. */
export interface Targets {
  x: ArrayLike<number>;
  y: ArrayLike<number>;
  describe(index: number): Omit<Readout, 'top'>;
}

/** Values behind a plot, row by row. */
export interface ValueTable {
  columns: { label: string; unit: string }[];
  rows: number;
  cell(row: number, column: number): number | string;
}

export interface BuiltPlot {
  plot: Plot;
  targets: Targets;
  table: ValueTable;
}

/** Smallest and largest of all finite numbers, widened a little; `fallback` where there are none. */
export function rangeOf(lists: readonly ArrayLike<number>[], fallback: [number, number], pad = 0.04): [number, number] {
  let low = Number.POSITIVE_INFINITY;
  let high = Number.NEGATIVE_INFINITY;
  for (const list of lists)
    for (let i = 0; i < list.length; i++) {
      const value = list[i] as number;
      if (Number.isFinite(value)) {
        if (value < low) low = value;
        if (value > high) high = value;
      }
    }
  if (!(high >= low)) return fallback;
  if (high === low) return [low - (Math.abs(low) * 0.1 || 1), high + (Math.abs(high) * 0.1 || 1)];
  return [low - (high - low) * pad, high + (high - low) * pad];
}

/** The whole of an axis as a domain; one point gets some room. */
export function domainOf(values: readonly number[]): [number, number] {
  return rangeOf([values], [0, 1], 0);
}
