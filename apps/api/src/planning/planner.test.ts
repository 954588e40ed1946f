import { monitorEventLoopDelay } from 'node:perf_hooks';
import { type LoadedKernel, loadCurrentKernel } from '@nightcone/kernel/node';
import { afterAll, beforeAll, describe, expect, test } from 'vitest';
import { Refusal } from '../refusal.ts';
import type { PlannedPoint } from './plan-question.ts';
import { Planner } from './planner.ts';
import { probeIndices } from './probe-indices.ts';

let kernel: LoadedKernel;
let planner: Planner;
beforeAll(async () => {
  kernel = await loadCurrentKernel();
  planner = new Planner(async () => kernel.bytes);
});
afterAll(() => planner.stop());

const question = (first: number, second: number) => ({
  specification: {
    schema: 'nightcone.job/1' as const,
    model: 'landau-levels',
    parameters: { fieldT: 1, levels: 2 },
    numerics: {},
  },
  axes: [
    { pointers: ['/system/massEv'], range: { start: '0', stop: '1', count: first } },
    { pointers: ['/diracVelocityEvNm'], range: { start: '0.5', stop: '0.6', count: second } },
  ],
});
const plan = (first: number, second: number, more: object = {}) =>
  planner.plan({
    kernel,
    question: question(first, second),
    full: false,
    signal: new AbortController().signal,
    onBatch: () => {},
    ...more,
  });

test('points come in the order of the grid, the last axis fastest', async () => {
  const points: PlannedPoint[] = [];
  const summary = await plan(3, 2, { onBatch: (batch: PlannedPoint[]) => void points.push(...batch) });
  expect(summary).toMatchObject({ count: 6, first: { hash: points[0]?.hash } });
  expect(points.map(({ values }) => values)).toEqual([
    [0, 0.5],
    [0, 0.6],
    [0.5, 0.5],
    [0.5, 0.6],
    [1, 0.5],
    [1, 0.6],
  ]);
  expect(new Set(points.map(({ hash }) => hash)).size).toBe(6);
});

test('what the kernel itself refuses is refused at its point', async () => {
  const short = question(2, 2);
  const specification = { ...short.specification, numerics: { method: { kind: 'grid', cellsPerMagneticLength: 4 } } };
  const bilayer = { ...specification, parameters: { system: { kind: 'bilayer' } } };
  // The note of the model speaks first where there is one; the plan itself goes through.
  const { notes } = await plan(1, 1, { question: { specification: bilayer, axes: [] } });
  expect(notes[0]?.severity).toBe('refuse');
});

test('a refusal crosses the thread with its fields', async () => {
  const bad = { ...question(2, 2), specification: { ...question(2, 2).specification, model: 'none' } };
  const refusal = await plan(1, 1, { question: bad }).catch((error: unknown) => error);
  expect(refusal).toBeInstanceOf(Refusal);
  expect(refusal).toMatchObject({
    code: 'invalid-specification',
    more: { errors: [{ field: '/specification/model' }] },
  });
});

test('a small plan does not wait for a large one, which stops when its caller leaves', async () => {
  const leave = new AbortController();
  let largePoints = 0;
  const large = plan(400, 250, {
    signal: leave.signal,
    onBatch: (batch: PlannedPoint[]) => {
      largePoints += batch.length;
    },
  });
  const ended = expect(large).rejects.toThrow();
  await plan(2, 2);
  leave.abort();
  await ended;
  expect(largePoints).toBeLessThan(100_000);
  const before = largePoints;
  await plan(2, 2);
  expect(largePoints).toBe(before);
});

test('a batch that fails stops the plan', async () => {
  const onBatch = () => Promise.reject(new Error('the database is gone'));
  await expect(plan(400, 250, { onBatch })).rejects.toThrow('the database is gone');
});

test('100 000 points are planned while the event loop stays free', { timeout: 120_000 }, async () => {
  const delay = monitorEventLoopDelay({ resolution: 5 });
  let points = 0;
  delay.enable();
  const summary = await plan(400, 250, {
    full: true,
    onBatch: (batch: PlannedPoint[]) => {
      points += batch.length;
    },
  });
  delay.disable();
  expect([points, summary.count]).toEqual([100_000, 100_000]);
  // The largest single delay also holds what other processes of the machine took.
  expect(delay.percentile(99) / 1e6).toBeLessThan(50);
});

describe('points at which the kernel is asked', () => {
  test('are all of a small grid', () => {
    expect(probeIndices([4, 3])).toEqual([0, 1, 2, 3, 4, 5, 6, 7, 8, 9, 10, 11]);
    expect(probeIndices([])).toEqual([0]);
  });
  test('are corners, centre and a fixed two hundred of a large one', () => {
    const found = probeIndices([100, 1, 50, 20]);
    const corners = [0, 19, 49 * 20, 49 * 20 + 19].flatMap((place) => [place, 99 * 1000 + place]);
    expect(found).toEqual(expect.arrayContaining([...corners, 49 * 1000 + 24 * 20 + 9]));
    expect(found.length).toBeGreaterThan(200);
    expect(found.every((index) => index >= 0 && index < 100_000)).toBe(true);
    expect(probeIndices([100, 1, 50, 20])).toEqual(found);
  });
});
