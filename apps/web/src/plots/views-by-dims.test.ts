import { expect, test } from 'vitest';
import type { DataArray, ResultData } from './result-data.ts';
import { viewsByDims } from './views-by-dims.ts';

const array = (name: string, dims: string[], shape: number[], values: number[]): DataArray => ({
  name,
  dims,
  shape,
  unit: 'eV',
  values: Float64Array.from(values),
});
const arrays = [
  array('energyEv', ['energy'], [3], [1, 2, 3]),
  array(
    'angleDeg',
    ['angle'],
    [30],
    Array.from({ length: 30 }, (_, i) => i),
  ),
  array('conductance', ['energy'], [3], [4, 5, 6]),
  array(
    'transmission',
    ['energy', 'angle'],
    [3, 30],
    Array.from({ length: 90 }, (_, i) => i),
  ),
  array('bands', ['energy', 'band'], [3, 2], [1, 2, 3, 4, 5, 6]),
  array('bandsValid', ['energy', 'band'], [3, 2], [1, 1, 1, 0, 1, 1]),
  array('loose', ['nowhere', 'angle'], [3, 30], []),
];
const data: ResultData = {
  body: { model: 'a-model-without-plots', parameters: {}, numerics: {} },
  arrays: new Map(arrays.map((entry) => [entry.name, entry])),
};

test('arrays whose places are in the result are drawn, the rest is left out', () => {
  expect(viewsByDims('a-model-without-plots', arrays).map(({ id }) => id)).toEqual([
    'conductance',
    'transmission',
    'bands',
  ]);
});

test('few rows are lines with holes where an entry is not there, many rows are a map', () => {
  const [, map, lines] = viewsByDims('a-model-without-plots', arrays);
  const bands = lines?.build(data);
  expect(bands?.plot.marks).toHaveLength(2);
  expect(bands?.plot.marks[1]).toMatchObject({ kind: 'line', x: [1, 2, 3], y: [2, Number.NaN, 6] });
  expect(bands?.targets.x).toHaveLength(5);
  expect(bands?.table.cell(1, 2)).toBe('not there');
  expect(map?.build(data).plot.marks[0]).toMatchObject({ kind: 'cells' });
});
