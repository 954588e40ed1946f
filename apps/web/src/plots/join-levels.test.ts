import { expect, test } from 'vitest';
import { joinLevels } from './join-levels.ts';

/** Two straight bands E = ±v k that cross between two points of the axis. */
function crossing(axis: number[]) {
  const energies: number[] = [];
  const slopes: number[] = [];
  for (const k of axis) {
    const pair = [
      [0.5 * k, 0.5],
      [-0.5 * k, -0.5],
    ].sort((a, b) => (a[0] as number) - (b[0] as number));
    for (const [energy, slope] of pair) {
      energies.push(energy as number);
      slopes.push(slope as number);
    }
  }
  return { axis, energies, slopes, bounds: (row: number) => [2 * row, 2 * row + 2] as const };
}

test('crossing bands are followed through the crossing, not along their order', () => {
  const rows = crossing([-0.25, -0.15, -0.05, 0.05, 0.15, 0.25]);
  const lines = joinLevels(rows);
  expect(lines).toHaveLength(2);
  for (const line of lines) {
    expect(line).toHaveLength(6);
    const slopes = new Set(line.map(({ at }) => rows.slopes[at]));
    expect(slopes.size).toBe(1);
  }
});

test('a degenerate pair gives two whole lines', () => {
  const axis = [0, 0.1, 0.2];
  const energies = axis.flatMap(() => [0.1, 0.1]);
  const lines = joinLevels({ axis, energies, slopes: energies.map(() => 0), bounds: (r) => [2 * r, 2 * r + 2] });
  expect(lines.map((line) => line.length)).toEqual([3, 3]);
});

test('levels that no slope explains stay alone', () => {
  const lines = joinLevels({ axis: [0, 1], energies: [0, 5], slopes: [0, 0], bounds: (row) => [row, row + 1] });
  expect(lines.map((line) => line.length)).toEqual([1, 1]);
});

test('levels that leave the window end their line', () => {
  const axis = [0, 0.1, 0.2];
  const bounds = [
    [0, 2],
    [2, 3],
    [3, 4],
  ] as const;
  const lines = joinLevels({
    axis,
    energies: [0, 0.1, 0.05, 0.1],
    slopes: [0.5, 0.5, 0.5, 0.5],
    bounds: (row) => bounds[row] as readonly [number, number],
  });
  expect(lines.map((line) => line.length).sort()).toEqual([1, 3]);
});
