import type { Submission, Sweep, SweepPoint } from '@nightcone/contracts';
import { describe, expect, test } from 'vitest';
import { groupFailures } from './failed-points.tsx';
import { gridCells, gridShape } from './map-layout.ts';
import { pointWords, valueWords } from './point-values.ts';
import { sweepProgress, sweepStateWord } from './sweep-state.ts';

const sweep = (counts: Sweep['counts'], over: Partial<Submission> = {}) => ({
  points: 10,
  counts,
  submission: { state: 'active', when: 'now', ...over } as Submission,
});

describe('state of a sweep', () => {
  test('known results count as done, broken-off points as failed', () => {
    expect(
      sweepProgress(sweep({ finished: 3, reused: 2, 'broken-off': 1, failed: 1, running: 1 } as Sweep['counts'])),
    ).toEqual({
      total: 10,
      done: 5,
      running: 1,
      failed: 2,
    });
  });
  test('is said as people ask for it', () => {
    const none = {} as Sweep['counts'];
    expect(sweepStateWord(sweep(none))).toBe('waiting');
    expect(sweepStateWord(sweep(none, { when: 'tonight' }))).toBe('tonight');
    expect(sweepStateWord(sweep({ running: 1 } as Sweep['counts']))).toBe('running');
    expect(sweepStateWord(sweep({ finished: 9, failed: 1 } as Sweep['counts'], { state: 'done' }))).toBe(
      'finished, some failed',
    );
  });
});

describe('map of points', () => {
  const axis = (count: number) => ({ pointers: ['/fieldT'], values: Array.from({ length: count }, (_, i) => [i]) });
  test('two axes: the last one along the columns; one axis wraps', () => {
    expect(gridShape([axis(12), axis(40)], 480, 960)).toEqual([40, 12]);
    expect(gridShape([axis(100)], 100, 180)).toEqual([10, 10]);
    expect(gridShape([], 1, 180)).toEqual([1, 1]);
  });
  test('a hundred thousand points share cells, and a failed one still shows', () => {
    const states: SweepPoint['state'][] = new Array(100_000).fill('finished');
    states[54_321] = 'failed';
    const grid = gridCells(states, 400, 250);
    expect(grid.cells.length).toBeLessThanOrEqual(20_000);
    expect(grid.cells.filter((look) => look === 'failed')).toHaveLength(1);
    expect(grid.cells.filter((look) => look === 'done')).toHaveLength(grid.cells.length - 1);
  });
});

test('failures are gathered by their reason; what can be put back stands apart', () => {
  const point = (index: number, state: SweepPoint['state'], text: string): SweepPoint => ({
    index,
    values: [index],
    jobHash: 'a'.repeat(64),
    state,
    resultDigest: null,
    failure: { code: 'not-converged', text },
    cpuMs: null,
  });
  const groups = groupFailures([
    point(0, 'failed', 'no'),
    point(1, 'failed', 'no'),
    point(2, 'broken-off', 'no'),
    point(3, 'finished', 'no'),
  ]);
  expect(groups.map((group) => [group.points.length, group.brokenOff])).toEqual([
    [2, false],
    [1, true],
  ]);
});

test('values of a point in words', () => {
  expect(valueWords(0.0009, 'eV')).toBe('900 µeV');
  expect(pointWords([{ pointer: '/width/count', title: 'dimer lines', unit: '' }], [42])).toBe('dimer lines 42');
});
