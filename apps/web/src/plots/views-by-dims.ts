import { formatQuantity } from '@nightcone/drawing';
import { findModel } from '@nightcone/models';
import { type BuiltPlot, domainOf, rangeOf } from './built-plot.ts';
import { buildGridMap } from './grid-map.ts';
import { isValid, need, type ResultData } from './result-data.ts';
import type { View, ViewedArray } from './view.ts';

/** More rows than this along the second dimension are drawn as a map, fewer as lines. */
const MOST_LINES = 24;

/** The array that holds the places along a dimension: the only one that has this dimension alone. */
function coordinateOf(dim: string, arrays: readonly ViewedArray[]): string | undefined {
  return arrays.find(({ name, dims }) => dims.length === 1 && dims[0] === dim && !name.endsWith('Valid'))?.name;
}

const titleOf = (model: string, name: string) => {
  const display = findModel(model)?.results.find((array) => array.name === name)?.display;
  return { title: display?.title ?? name, symbol: display?.symbol ?? name };
};

/** For a model without plots of its own: each array over one or two dimensions whose places are in the result. */
export function viewsByDims(model: string, arrays: readonly ViewedArray[]): View[] {
  const views: View[] = [];
  for (const array of arrays) {
    const [first, second] = array.dims;
    if (first === undefined || array.dims.length > 2 || array.ragged || array.name.endsWith('Valid')) continue;
    const x = coordinateOf(first, arrays);
    if (x === undefined || x === array.name || array.shape.some((length) => length === 0)) continue;
    const y = second === undefined ? undefined : coordinateOf(second, arrays);
    const lines = second === undefined || (array.shape[1] as number) <= MOST_LINES;
    if (!lines && y === undefined) continue;
    views.push({
      id: array.name,
      label: titleOf(model, array.name).title,
      needs: [array.name, x],
      optional: [`${array.name}Valid`, ...(y ? [y] : [])],
      build: (data) => (lines ? buildLines(data, array.name, x) : buildMap(data, array.name, x, y as string)),
    });
  }
  return views;
}

function buildLines(data: ResultData, name: string, along: string): BuiltPlot {
  const { values, unit, shape } = need(data, name);
  const axis = need(data, along);
  const { title, symbol } = titleOf(data.body.model, name);
  const place = titleOf(data.body.model, along);
  const places = Array.from(axis.values, Number);
  const rows = shape[1] ?? 1;
  const at = (i: number, row: number) => {
    const index = i * rows + row;
    return isValid(data, name, index) ? (values[index] as number) : Number.NaN;
  };
  const lines = Array.from({ length: rows }, (_, row) => places.map((_place, i) => at(i, row)));
  const all = lines.flatMap((line, row) => line.map((value, i) => ({ value, row, i })));
  const seen = all.filter(({ value }) => Number.isFinite(value));
  return {
    plot: {
      caption: `${title} against ${place.title}.`,
      x: { symbol: place.symbol, unit: axis.unit, domain: domainOf(places) },
      y: { symbol, unit, domain: rangeOf(lines, [0, 1]) },
      marks: lines.map((line) => ({ kind: 'line' as const, role: 'ink' as const, x: places, y: line })),
    },
    targets: {
      x: seen.map(({ i }) => places[i] as number),
      y: seen.map(({ value }) => value),
      describe(index) {
        const { value, row, i } = seen[index] as (typeof seen)[number];
        return {
          value: formatQuantity(value, unit),
          description: rows > 1 ? `${title}, ${row + 1} of ${rows}` : title,
          rows: [{ symbol: place.symbol, label: place.title, value: formatQuantity(places[i] as number, axis.unit) }],
        };
      },
    },
    table: {
      columns: [
        { label: place.title, unit: axis.unit },
        ...lines.map((_, row) => ({ label: rows > 1 ? `${title} ${row + 1}` : title, unit })),
      ],
      rows: places.length,
      cell: (i, column) => {
        if (column === 0) return places[i] as number;
        const value = at(i, column - 1);
        return Number.isFinite(value) ? value : 'not there';
      },
    },
  };
}

function buildMap(data: ResultData, name: string, alongX: string, alongY: string): BuiltPlot {
  const { values, unit } = need(data, name);
  const axis = (array: string) => {
    const { title, symbol } = titleOf(data.body.model, array);
    const found = need(data, array);
    return { symbol, label: title, unit: found.unit, values: Array.from(found.values, Number) };
  };
  const { title, symbol } = titleOf(data.body.model, name);
  const shown = Float64Array.from(values, (value, i) => (isValid(data, name, i) ? Number(value) : Number.NaN));
  return buildGridMap({
    caption: `${title} over ${axis(alongX).label} and ${axis(alongY).label}.`,
    x: axis(alongX),
    y: axis(alongY),
    z: { symbol, label: title, unit },
    values: shown,
    signed: shown.some((value) => value < 0),
  });
}
