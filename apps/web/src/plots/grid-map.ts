import { formatQuantity } from '@nightcone/drawing';
import { type BuiltPlot, domainOf, rangeOf } from './built-plot.ts';

/** values[ix * y.length + iy] over two axes. */
export interface GridMap {
  caption: string;
  x: { symbol: string; label: string; unit: string; values: readonly number[] };
  y: { symbol: string; label: string; unit: string; values: readonly number[] };
  z: { symbol: string; label: string; unit: string };
  values: ArrayLike<number>;
  /** Values of both signs: a diverging scale around 0. */
  signed?: boolean;
}

/** A heat map with its read-out and table; columns are ordered by x, whichever way the axis ran. */
export function buildGridMap(map: GridMap): BuiltPlot {
  const [xs, xOrder] = ascending(map.x.values);
  const [ys, yOrder] = ascending(map.y.values);
  const values = new Float64Array(xs.length * ys.length);
  for (let i = 0; i < xs.length; i++)
    for (let j = 0; j < ys.length; j++)
      values[i * ys.length + j] = map.values[(xOrder[i] as number) * ys.length + (yOrder[j] as number)] ?? Number.NaN;
  const [low, high] = rangeOf([values], [0, 1], 0);
  const most = Math.max(Math.abs(low), Math.abs(high));
  return {
    plot: {
      caption: map.caption,
      x: { symbol: map.x.symbol, unit: map.x.unit, domain: domainOf(xs) },
      y: { symbol: map.y.symbol, unit: map.y.unit, domain: domainOf(ys) },
      marks: [
        {
          kind: 'cells',
          x: xs,
          y: ys,
          values,
          domain: map.signed ? [-most, most] : [Math.min(0, low), high],
          symbol: map.z.symbol,
          unit: map.z.unit,
          scale: map.signed ? 'signed' : 'density',
        },
      ],
    },
    targets: {
      x: xs.flatMap((x) => ys.map(() => x)),
      y: xs.flatMap(() => ys),
      describe(i) {
        const x = xs[Math.floor(i / ys.length)] as number;
        const y = ys[i % ys.length] as number;
        return {
          value: formatQuantity(values[i] as number, map.z.unit),
          description: map.z.label,
          rows: [
            { symbol: map.x.symbol, label: map.x.label, value: formatQuantity(x, map.x.unit) },
            { symbol: map.y.symbol, label: map.y.label, value: formatQuantity(y, map.y.unit) },
          ],
        };
      },
    },
    table: {
      columns: [
        { label: map.x.label, unit: map.x.unit },
        { label: map.y.label, unit: map.y.unit },
        { label: map.z.label, unit: map.z.unit },
      ],
      rows: values.length,
      cell: (row, column) => [xs[Math.floor(row / ys.length)], ys[row % ys.length], values[row]][column] as number,
    },
  };
}

function ascending(values: readonly number[]): [number[], number[]] {
  const order = values.map((_, i) => i).sort((a, b) => (values[a] as number) - (values[b] as number));
  return [order.map((i) => values[i] as number), order];
}
