import { expect, test } from 'vitest';
import { cellEdges, emptyStep, rasterizeCells } from './cells.ts';
import type { CellsMark } from './plot.ts';

const mark = (x: number[], y: number[], values: number[]): CellsMark => ({
  kind: 'cells',
  x,
  y,
  values,
  domain: [0, 1],
  symbol: 'D',
  unit: '',
  scale: 'density',
});

test('borders lie half-way between centres', () => {
  expect([...cellEdges([0, 1, 3])]).toEqual([-0.5, 0.5, 2, 4]);
});

test('two by two cells fill a square, the largest y on top', () => {
  const steps = rasterizeCells(mark([0, 1], [0, 1], [0, 0.5, 1, Number.NaN]), [-0.5, 1.5], [-0.5, 1.5], 4, 4);
  expect([...steps.subarray(0, 4)]).toEqual([20, 20, emptyStep, emptyStep]);
  expect([...steps.subarray(12)]).toEqual([0, 0, 39, 39]);
});

test('a line narrower than a pixel fades but stays', () => {
  const n = 400;
  const y = Array.from({ length: n }, (_, i) => i);
  const values = y.map((i) => (i === 201 ? 1 : 0));
  const steps = rasterizeCells(mark([0], y, values), [-0.5, 0.5], [-0.5, n - 0.5], 1, 40);
  expect([...steps].filter((step) => step > 0)).toHaveLength(1);
});

test('outside the cells a pixel stays empty', () => {
  const steps = rasterizeCells(mark([0, 1], [0, 1], [1, 1, 1, 1]), [5, 6], [0, 1], 2, 2);
  expect([...steps]).toEqual([emptyStep, emptyStep, emptyStep, emptyStep]);
});
