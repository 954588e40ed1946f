import type { SweepPoint } from '@nightcone/contracts';
import { formatQuantity, type Mark } from '@nightcone/drawing';
import { type BuiltPlot, domainOf, rangeOf } from './built-plot.ts';
import { buildGridMap } from './grid-map.ts';
import { axisIndices, type DrawnAxis } from './sweep-axis.ts';

export interface SweepQuantityData {
  label: string;
  symbol: string;
  unit: string;
  /** Values of the points that have arrived, by point index. */
  rows: ReadonlyMap<number, readonly number[]>;
}

interface SweepDrawing {
  axes: readonly DrawnAxis[];
  points: readonly SweepPoint[];
  quantity: SweepQuantityData;
  /** Which axis runs to the right; the others are lines (`along` null) or fixed. */
  xAxis: number;
  /** Index on every other axis that is shown; null: all of them. */
  fixed: readonly (number | null)[];
  /** Which number of a row a map shows. */
  entry?: number;
}

const ended = new Set(['failed', 'broken-off', 'cancelled']);

/** The quantity against one swept parameter: lines through single values in the order of the axis, dots for rows. */
export function buildSweepSeries({ axes, points, quantity, xAxis, fixed }: SweepDrawing): BuiltPlot {
  const lengths = axes.map((axis) => axis.places.length);
  const x = axes[xAxis] as DrawnAxis;
  const shown: { index: number; x: number; y: number }[] = [];
  const series = new Map<string, { x: number; y: number }[]>();
  const failed: number[] = [];
  let single = true;
  for (const point of points) {
    const at = axisIndices(point.index, lengths);
    if (fixed.some((index, axis) => axis !== xAxis && index !== null && at[axis] !== index)) continue;
    const place = x.places[at[xAxis] as number] as number;
    if (ended.has(point.state)) failed.push(place);
    const values = quantity.rows.get(point.index);
    const key = at.filter((_, axis) => axis !== xAxis).join(' ');
    const list = series.get(key) ?? [];
    series.set(key, list);
    // a failed point breaks its line: never interpolated over
    if (ended.has(point.state)) list.push({ x: place, y: Number.NaN });
    if (!values) continue;
    if (values.length > 1) single = false;
    for (const y of values) {
      shown.push({ index: point.index, x: place, y });
      list.push({ x: place, y });
    }
  }
  const yDomain = rangeOf([shown.map(({ y }) => y)], [0, 1], 0.06);
  if (yDomain[0] > 0 && yDomain[0] < 0.35 * yDomain[1]) yDomain[0] = 0;
  const marks: Mark[] = failed.map((at) => ({
    kind: 'rule',
    role: 'failed',
    across: 'x',
    at,
    dotted: true,
    label: '×',
  }));
  for (const list of series.values()) {
    const sorted = list.toSorted((a, b) => a.x - b.x);
    const xs = sorted.map((each) => each.x);
    const ys = sorted.map((each) => each.y);
    // counts (atoms, levels) are not joined: neighbours may belong to different families
    if (single && !x.ordered && !xs.every(Number.isInteger))
      marks.push({ kind: 'line', role: 'other', x: xs, y: ys, width: 1 });
    marks.push({ kind: 'points', role: 'ink', x: xs, y: ys, radius: shown.length > 800 ? 1.4 : 2 });
  }
  return {
    plot: {
      caption: `${capital(quantity.label)} against ${x.label}; ${quantity.rows.size} of ${points.length} points are there${
        failed.length > 0 ? `, ${failed.length} failed (×)` : ''
      }.`,
      x: {
        symbol: x.symbol,
        unit: x.unit,
        domain: widened(domainOf(x.places)),
        integer: x.places.every(Number.isInteger),
      },
      y: { symbol: quantity.symbol, unit: quantity.unit, domain: yDomain },
      marks,
    },
    targets: {
      x: shown.map((each) => each.x),
      y: shown.map((each) => each.y),
      describe(i) {
        const { index, y } = shown[i] as (typeof shown)[number];
        return {
          ...describePoint(axes, index, lengths),
          value: formatQuantity(y, quantity.unit),
          description: quantity.label,
        };
      },
    },
    table: valueTable(axes, lengths, points, quantity),
  };
}

/** Two swept parameters as a map; points that have not arrived stay empty, failed ones are crossed. */
export function buildSweepMap(
  { axes, points, quantity, xAxis, fixed, entry = 0 }: SweepDrawing,
  yAxis: number,
): BuiltPlot {
  const lengths = axes.map((axis) => axis.places.length);
  const x = axes[xAxis] as DrawnAxis;
  const y = axes[yAxis] as DrawnAxis;
  const values = new Float64Array(x.places.length * y.places.length).fill(Number.NaN);
  const indices = new Int32Array(values.length).fill(-1);
  const failedX: number[] = [];
  const failedY: number[] = [];
  for (const point of points) {
    const at = axisIndices(point.index, lengths);
    if (fixed.some((index, axis) => axis !== xAxis && axis !== yAxis && index !== null && at[axis] !== index)) continue;
    const place = (at[xAxis] as number) * y.places.length + (at[yAxis] as number);
    indices[place] = point.index;
    values[place] = quantity.rows.get(point.index)?.[entry] ?? Number.NaN;
    if (ended.has(point.state)) {
      failedX.push(x.places[at[xAxis] as number] as number);
      failedY.push(y.places[at[yAxis] as number] as number);
    }
  }
  const built = buildGridMap({
    caption: `${capital(quantity.label)} over ${x.label} and ${y.label}; ${quantity.rows.size} of ${points.length} points are there.`,
    x: { symbol: x.symbol, label: x.label, unit: x.unit, values: x.places },
    y: { symbol: y.symbol, label: y.label, unit: y.unit, values: y.places },
    z: { symbol: quantity.symbol, label: quantity.label, unit: quantity.unit },
    values,
    signed: values.some((value) => value < 0),
  });
  // the grid is drawn in ascending order of both axes: find the point behind each of its places again
  const order = (places: readonly number[]) =>
    places.map((_, i) => i).sort((a, b) => (places[a] as number) - (places[b] as number));
  const [xOrder, yOrder] = [order(x.places), order(y.places)];
  return {
    ...built,
    plot: {
      ...built.plot,
      x: { ...built.plot.x, domain: widened(domainOf(x.places)) },
      y: { ...built.plot.y, domain: widened(domainOf(y.places)) },
      marks: [
        ...built.plot.marks,
        { kind: 'points', role: 'failed', shape: 'cross', radius: 4, x: failedX, y: failedY },
      ],
    },
    targets: {
      ...built.targets,
      describe(i) {
        const row = xOrder[Math.floor(i / y.places.length)] as number;
        const column = yOrder[i % y.places.length] as number;
        const index = indices[row * y.places.length + column] as number;
        const value = values[row * y.places.length + column] as number;
        return {
          ...describePoint(axes, index, lengths),
          value: Number.isNaN(value) ? 'not there yet' : formatQuantity(value, quantity.unit),
          description: quantity.label,
        };
      },
    },
    table: valueTable(axes, lengths, points, quantity),
  };
}

const capital = (text: string) => text.charAt(0).toUpperCase() + text.slice(1);
/** Half a step of room, so that the outer points are whole. */
const widened = ([low, high]: readonly [number, number]): [number, number] => {
  const room = (high - low) * 0.03 || 0.5;
  return [low - room, high + room];
};

function describePoint(axes: readonly DrawnAxis[], index: number, lengths: readonly number[]) {
  const at = axisIndices(index, lengths);
  return {
    point: index,
    rows: axes.map((axis, i) => {
      const place = at[i] as number;
      return {
        symbol: axis.symbol,
        label: axis.label,
        value: axis.ordered ? (axis.texts[place] ?? '') : formatQuantity(axis.places[place] as number, axis.unit),
      };
    }),
  };
}

function valueTable(
  axes: readonly DrawnAxis[],
  lengths: readonly number[],
  points: readonly SweepPoint[],
  quantity: SweepQuantityData,
): BuiltPlot['table'] {
  const rows = points.flatMap((point): { point: SweepPoint; value: number | null; order: number }[] => {
    const values = quantity.rows.get(point.index);
    return values ? values.map((value, order) => ({ point, value, order })) : [{ point, value: null, order: 0 }];
  });
  return {
    columns: [
      ...axes.map(({ label, unit }) => ({ label, unit })),
      { label: quantity.label, unit: quantity.unit },
      { label: 'number', unit: '' },
      { label: 'state', unit: '' },
    ],
    rows: rows.length,
    cell(row, column) {
      const { point, value, order } = rows[row] as (typeof rows)[number];
      const axis = axes[column];
      if (axis) {
        const place = axisIndices(point.index, lengths)[column] as number;
        return axis.ordered ? (axis.texts[place] ?? '') : (axis.places[place] as number);
      }
      return [value ?? '', order + 1, point.state][column - axes.length] as number | string;
    },
  };
}
