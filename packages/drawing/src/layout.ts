import { scaleLinear } from 'd3';
import { displayUnit } from './axis-unit.ts';
import { roleStyles } from './palette.ts';
import { linePath, round } from './path.ts';
import type { CellsMark, Mark, Plot, PointsMark, Role, Size } from './plot.ts';
import { symbolRuns, type TextRun } from './symbol.ts';
import { axisTicks } from './ticks.ts';

export interface Domains {
  x: readonly [number, number];
  y: readonly [number, number];
}
/** px; `x`, `y` is the upper left corner. */
export interface Box {
  x: number;
  y: number;
  width: number;
  height: number;
}
export interface AxisGeometry {
  /** Place of the spine, 8 px off the data. */
  at: number;
  ticks: { at: number; label: string | null }[];
  symbol: TextRun[];
  unit: string;
  /** shown number = stored number × factor */
  factor: number;
}
export interface LineGeometry {
  role: Role;
  path: string;
  width: number;
  dash: string | null;
}
export interface PointsGeometry {
  role: Role;
  shape: NonNullable<PointsMark['shape']>;
  radius: number;
  /** x0, y0, x1, y1 … in px. */
  places: Float32Array;
}
export interface RuleGeometry {
  role: Role;
  dotted: boolean;
  from: readonly [number, number];
  to: readonly [number, number];
  label?: string;
  anchor: 'start' | 'middle' | 'end';
}
export interface CellsGeometry {
  mark: CellsMark;
  box: Box;
  bar: Box & { ticks: { at: number; label: string }[]; symbol: TextRun[]; unit: string };
}
export interface Geometry {
  size: Size;
  domains: Domains;
  data: Box;
  x: AxisGeometry;
  y: AxisGeometry;
  lines: LineGeometry[];
  points: PointsGeometry[];
  rules: RuleGeometry[];
  cells: CellsGeometry[];
  side: { title: string; at: number; labels: { at: number; text: string }[] } | null;
  toX: (value: number) => number;
  toY: (value: number) => number;
  fromX: (pixel: number) => number;
  fromY: (pixel: number) => number;
}

const gap = 8;
const digitWidth = 7.3;

/** Where everything goes. `domains` is the visible window (zoom); without it, the plot's own. */
export function layoutPlot(plot: Plot, size: Size, domains?: Domains): Geometry {
  const shown = domains ?? { x: plot.x.domain, y: plot.y.domain };
  const cells = plot.marks.filter((mark): mark is CellsMark => mark.kind === 'cells');
  const yUnit = displayUnit(plot.y.unit, Math.max(Math.abs(shown.y[0]), Math.abs(shown.y[1])));
  const xUnit = displayUnit(plot.x.unit, Math.max(Math.abs(shown.x[0]), Math.abs(shown.x[1])));
  const top = 34;
  const bottom = 46;
  const height = Math.max(40, size.height - top - bottom);
  const yTicks = scaledTicks(shown.y, yUnit.factor, height, 56, plot.y.integer);
  const widest = Math.max(2, ...yTicks.map((tick) => tick.label?.length ?? 0));
  const left = round(widest * digitWidth + 10 + gap);
  const right = cells.length > 0 ? 74 : plot.side ? 34 : 14;
  const width = Math.max(40, size.width - left - right);
  const data: Box = { x: left, y: top, width: round(width), height: round(height) };
  const x = scaleLinear()
    .domain(shown.x)
    .range([data.x, data.x + data.width]);
  const y = scaleLinear()
    .domain(shown.y)
    .range([data.y + data.height, data.y]);
  const xTicks = scaledTicks(shown.x, xUnit.factor, width, 74, plot.x.integer);
  const place =
    (scale: (value: number) => number, factor: number) => (tick: { value: number; label: string | null }) => ({
      at: round(scale(tick.value / factor)),
      label: tick.label,
    });
  return {
    size,
    domains: shown,
    data,
    x: {
      at: round(data.y + data.height + gap),
      ticks: xTicks.map(place(x, xUnit.factor)),
      symbol: symbolRuns(plot.x.symbol),
      unit: xUnit.unit,
      factor: xUnit.factor,
    },
    y: {
      at: round(data.x - gap),
      ticks: yTicks.map(place(y, yUnit.factor)),
      symbol: symbolRuns(plot.y.symbol),
      unit: yUnit.unit,
      factor: yUnit.factor,
    },
    ...layoutMarks(plot.marks, data, x, y, shown),
    cells: cells.map((mark) => layoutCells(mark, data, shown, x, y)),
    side: plot.side
      ? { title: plot.side.title, at: data.x + data.width + 10, labels: spread(plot.side.labels, y, data) }
      : null,
    toX: (value) => x(value),
    toY: (value) => y(value),
    fromX: (pixel) => x.invert(pixel),
    fromY: (pixel) => y.invert(pixel),
  };
}

function scaledTicks(
  domain: readonly [number, number],
  factor: number,
  length: number,
  spacing: number,
  integer = false,
) {
  return axisTicks([domain[0] * factor, domain[1] * factor], length, spacing, integer);
}

function layoutMarks(
  marks: readonly Mark[],
  data: Box,
  x: (value: number) => number,
  y: (value: number) => number,
  shown: Domains,
) {
  const lines: LineGeometry[] = [];
  const points: PointsGeometry[] = [];
  const rules: RuleGeometry[] = [];
  for (const mark of marks) {
    if (mark.kind === 'line') {
      const path = linePath(mark, x, y, shown.x);
      const style = roleStyles[mark.role];
      if (path)
        lines.push({
          role: mark.role,
          path,
          width: mark.width ?? style.width,
          dash: mark.dashed ? '5 3' : style.dash,
        });
    } else if (mark.kind === 'points') {
      points.push({
        role: mark.role,
        shape: mark.shape ?? 'dot',
        radius: mark.radius ?? 1.8,
        places: placesOf(mark, x, y, shown),
      });
    } else if (mark.kind === 'rule') {
      const [low, high] = mark.across === 'x' ? shown.x : shown.y;
      if (mark.at < low || mark.at > high) continue;
      const at = round(mark.across === 'x' ? x(mark.at) : y(mark.at));
      const above = data.y - (mark.label && mark.role !== 'failed' ? 16 : 0);
      rules.push({
        role: mark.role,
        dotted: mark.dotted ?? false,
        from: mark.across === 'x' ? [at, above] : [data.x, at],
        to: mark.across === 'x' ? [at, data.y + data.height] : [data.x + data.width, at],
        anchor: mark.role === 'failed' ? 'middle' : at > data.x + data.width - 40 ? 'end' : 'start',
        ...(mark.label ? { label: mark.label } : {}),
      });
    }
  }
  return { lines, points, rules };
}

function placesOf(mark: PointsMark, x: (v: number) => number, y: (v: number) => number, shown: Domains): Float32Array {
  const out: number[] = [];
  for (let i = 0; i < mark.x.length; i++) {
    const xi = mark.x[i] as number;
    const yi = mark.y[i] as number;
    if (xi >= shown.x[0] && xi <= shown.x[1] && yi >= shown.y[0] && yi <= shown.y[1])
      out.push(round(x(xi)), round(y(yi)));
  }
  return Float32Array.from(out);
}

function layoutCells(
  mark: CellsMark,
  data: Box,
  shown: Domains,
  x: (value: number) => number,
  y: (value: number) => number,
): CellsGeometry {
  const shownUnit = displayUnit(mark.unit, Math.max(Math.abs(mark.domain[0]), Math.abs(mark.domain[1])));
  const barX = data.x + data.width + 14;
  const scale = scaleLinear()
    .domain(mark.domain)
    .range([data.y + data.height, data.y]);
  return {
    mark,
    box: {
      x: round(x(shown.x[0])),
      y: round(y(shown.y[1])),
      width: round(x(shown.x[1]) - x(shown.x[0])),
      height: round(y(shown.y[0]) - y(shown.y[1])),
    },
    bar: {
      x: barX,
      y: data.y,
      width: 8,
      height: data.height,
      ticks: scaledTicks(mark.domain, shownUnit.factor, data.height, 70)
        .filter((tick) => tick.label !== null)
        .map((tick) => ({ at: round(scale(tick.value / shownUnit.factor)), label: tick.label as string })),
      symbol: symbolRuns(mark.symbol),
      unit: shownUnit.unit,
    },
  };
}

/** Labels at least 13 px apart; where they crowd, those nearest to zero stay. */
function spread(labels: readonly { at: number; text: string }[], y: (value: number) => number, data: Box) {
  const kept: { at: number; text: string }[] = [];
  for (const label of [...labels].sort((a, b) => Math.abs(a.at) - Math.abs(b.at) || a.at - b.at)) {
    const at = round(y(label.at));
    if (at < data.y - 2 || at > data.y + data.height + 2) continue;
    if (kept.every((other) => Math.abs(other.at - at) >= 13)) kept.push({ at, text: label.text });
  }
  return kept.sort((a, b) => a.at - b.at);
}
