import type { LastNight, Night, Submission } from '@nightcone/contracts';
import { expect, test } from 'vitest';
import { headline } from './headline.ts';
import { recentlyEnded } from './recent-work.tsx';
import { workState } from './work-state.ts';

const zone = 'Europe/Berlin';
const submission = (over: Partial<Submission>): Submission =>
  ({
    kind: 'sweep',
    mine: true,
    state: 'active',
    when: 'now',
    unit: 'jobs',
    progress: { done: 0, total: 25, running: 0, failed: 0 },
    ...over,
  }) as Submission;
const night = (over: Partial<Night> = {}): Night =>
  ({
    window: { from: '2026-02-12T19:00:00Z', to: '2026-02-13T05:00:00Z', open: true },
    myEnd: { at: '2026-02-13T02:18:00Z', plusMinusS: 700 },
    ...over,
  }) as Night;
const running = submission({ progress: { done: 14, total: 25, running: 4, failed: 0 } });

test('one running sweep: how far it is and when the last job ends', () => {
  expect(headline([running], night(), undefined, zone)).toBe(
    'Your sweep is at 14 of 25 jobs. Your last job should end at 03:18.',
  );
});

test('several running, or all waiting', () => {
  expect(headline([running, running], night({ myEnd: null }), undefined, zone)).toBe(
    'Two of your questions are running.',
  );
  expect(headline([submission({})], night({ myEnd: null }), undefined, zone)).toBe(
    'Your sweep is waiting for its turn.',
  );
  expect(headline([submission({ state: 'paused' })], night({ myEnd: null }), undefined, zone)).toBe(
    'Your sweep is paused.',
  );
});

test('work marked tonight waits for the window', () => {
  const closed = night({ myEnd: null, window: { ...night().window, open: false } });
  expect(headline([submission({ when: 'tonight' })], closed, undefined, zone)).toBe(
    'Your work starts when the night window opens at 20:00.',
  );
});

test('others’ work is not mine; the morning tells what the night did', () => {
  const others = [submission({ mine: false })];
  expect(headline(others, night(), undefined, zone)).toBe('Nothing of yours is running.');
  const report = { finished: 146, failed: 3 } as LastNight;
  expect(headline(others, night(), report, zone)).toBe('Last night finished 146 of 149 jobs.');
  expect(headline([], night(), { ...report, failed: 0 }, zone)).toBe('Last night finished all 146 jobs.');
});

test('an active submission runs, waits for its turn, or waits for the night', () => {
  expect(workState(running)).toBe('running');
  expect(workState(submission({}))).toBe('waiting');
  expect(workState(submission({ when: 'tonight' }))).toBe('tonight');
  expect(workState(submission({ state: 'paused', progress: running.progress }))).toBe('paused');
});

test('what ended within a day is listed once: not what last night’s report tells', () => {
  const now = Date.parse('2026-02-13T08:00:00Z');
  const ended = (sweepId: string, finishedAt: string) =>
    submission({ sweepId, jobHash: null, state: 'done', finishedAt });
  const rows = [
    ended('a', '2026-02-13T02:00:00Z'),
    ended('b', '2026-02-13T07:00:00Z'),
    ended('c', '2026-02-13T07:30:00Z'),
    ended('d', '2026-02-11T07:00:00Z'),
  ];
  const told = [{ sweepId: 'a', jobHash: null }];
  expect(recentlyEnded(rows, told, now).map((row) => row.sweepId)).toEqual(['c', 'b']);
});
