import { expect, test } from 'vitest';
import { axisTicks } from './ticks.ts';

const labels = (...args: Parameters<typeof axisTicks>) =>
  axisTicks(...args)
    .filter((tick) => tick.label !== null)
    .map((tick) => tick.label);

test('labels are round, without empty decimals, and have a real minus', () => {
  expect(labels([-1, 1], 360, 74)).toEqual(['−1', '−0.5', '0', '0.5', '1']);
  expect(labels([-250, 250], 350, 56)).toEqual(['−200', '−100', '0', '100', '200']);
});

test('a short axis still has three labels', () => {
  expect(labels([-470, 470], 190, 56).length).toBeGreaterThanOrEqual(3);
});

test('whole axes get whole ticks only', () => {
  const ticks = axisTicks([10, 14], 600, 40, true);
  expect(ticks.every((tick) => Number.isInteger(tick.value))).toBe(true);
});

test('an empty domain has no ticks', () => {
  expect(axisTicks([1, 1], 100, 50)).toEqual([]);
});
