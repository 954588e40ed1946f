import type { SweepPoint } from '@nightcone/contracts';
import { expect, test } from 'vitest';
import { axisIndices, drawnAxis } from './sweep-axis.ts';
import { buildSweepMap, buildSweepSeries } from './sweep-series.ts';

const specification = {
  schema: 'nightcone.job/1',
  model: 'continuum-ribbon',
  parameters: { width: { kind: 'dimer-lines', count: 10 }, edge: { kind: 'armchair' } },
  numerics: {},
};
const point = (index: number, state: SweepPoint['state']): SweepPoint => ({
  index,
  values: [],
  jobHash: String(index).repeat(64).slice(0, 64),
  state,
  resultDigest: null,
  failure: null,
  cpuMs: null,
});
const width = drawnAxis(
  { model: 'continuum-ribbon', specification },
  { pointers: ['/width/count'], values: [[10], [11], [12]] },
);

test('a swept place takes its words, symbol and unit from the definition', () => {
  expect(width).toMatchObject({ label: 'dimer lines', symbol: 'N', unit: '', places: [10, 11, 12], ordered: false });
});

test('the last axis runs fastest', () => {
  expect(axisIndices(5, [2, 3])).toEqual([1, 2]);
});

test('a failed point is a dotted line and never joined over', () => {
  const field = { ...width, label: 'field', places: [0.5, 1, 1.5] };
  const built = buildSweepSeries({
    axes: [field],
    points: [point(0, 'finished'), point(1, 'failed'), point(2, 'reused')],
    quantity: {
      label: 'gap',
      symbol: '\\Delta',
      unit: 'eV',
      rows: new Map([
        [0, [0.1]],
        [2, [0.3]],
      ]),
    },
    xAxis: 0,
    fixed: [null],
  });
  expect(built.plot.marks[0]).toMatchObject({ kind: 'rule', role: 'failed', at: 1, dotted: true });
  const line = built.plot.marks.find((mark) => mark.kind === 'line');
  expect(line?.kind === 'line' && Array.from(line.y)).toEqual([0.1, Number.NaN, 0.3]);
  expect(built.targets.describe(1)).toMatchObject({ point: 2, value: '300 meV' });
  expect(built.plot.caption).toContain('2 of 3 points');
});

test('a map keeps the point behind each place when an axis runs downward', () => {
  const field = { ...width, label: 'field', places: [2, 1], texts: ['2', '1'] };
  const points = [0, 1, 2, 3, 4, 5].map((i) => point(i, 'finished'));
  const built = buildSweepMap(
    {
      axes: [field, width],
      points,
      quantity: { label: 'gap', symbol: 'D', unit: 'eV', rows: new Map(points.map(({ index }) => [index, [index]])) },
      xAxis: 0,
      fixed: [null, null],
    },
    1,
  );
  // first place: field 1 (the second value), width 10 (the first): point 3
  expect(built.targets.describe(0)).toMatchObject({ point: 3, value: '3 eV' });
  expect(built.targets.x[0]).toBe(1);
});
