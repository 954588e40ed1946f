/**
 * A plot in the units of its data: what is drawn, not where. `layoutPlot` turns it into pixels. Styles are roles with a
 * meaning in physics (valley, closed form, measured); colours belong to a palette or to the page's style sheet.
 */

/** Text of one axis. `symbol` is TeX (the small subset of symbol.ts), `unit` the unit of the stored values. */
export interface AxisPlan {
  symbol: string;
  unit: string;
  domain: readonly [number, number];
  /** Only whole numbers get ticks (counts, level numbers). */
  integer?: boolean;
}

/** What a mark means. `mixed`: valleys mixed by the edge; `marker`: where something is, dotted. */
export const roles = ['ink', 'K', 'K-prime', 'mixed', 'closed', 'marker', 'other', 'failed', 'running'] as const;
export type Role = (typeof roles)[number];

/** y(x) or any curve; a NaN breaks it. With `slopes` (dy/dx in data units) segments are cubic, else straight. */
export interface LineMark {
  kind: 'line';
  role: Role;
  x: ArrayLike<number>;
  y: ArrayLike<number>;
  slopes?: ArrayLike<number>;
  /** px; the role's own width when absent. */
  width?: number;
  dashed?: boolean;
}

export interface PointsMark {
  kind: 'points';
  role: Role;
  x: ArrayLike<number>;
  y: ArrayLike<number>;
  shape?: 'dot' | 'open' | 'cross' | 'plus';
  radius?: number;
}

/** A line over the whole height at `x` (`across: 'y'`: over the whole width at `y`), with a word above it. */
export interface RuleMark {
  kind: 'rule';
  role: Role;
  across: 'x' | 'y';
  at: number;
  label?: string;
  dotted?: boolean;
}

/** values[ix * y.length + iy] on the centres x, y, both increasing; NaN is an empty cell. */
export interface CellsMark {
  kind: 'cells';
  x: ArrayLike<number>;
  y: ArrayLike<number>;
  values: ArrayLike<number>;
  domain: readonly [number, number];
  symbol: string;
  unit: string;
  scale: 'density' | 'signed';
}

/** A label at the right end of the height `y` (level numbers); crowded ones are left out, nearest to zero first. */
export interface SideLabels {
  title: string;
  labels: readonly { at: number; text: string }[];
}

export type Mark = LineMark | PointsMark | RuleMark | CellsMark;

export interface Plot {
  /** One sentence: what is seen, for captions and for those who cannot see it. */
  caption: string;
  x: AxisPlan;
  y: AxisPlan;
  marks: readonly Mark[];
  side?: SideLabels;
  /** Roles that are explained under the plot, in this order. */
  key?: readonly { role: Role; label: string; mark: 'line' | 'dot' | 'cross' }[];
}

export interface Size {
  width: number;
  height: number;
}
