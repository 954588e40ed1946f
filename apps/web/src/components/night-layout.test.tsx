import type { Night } from '@nightcone/contracts';
import { expect, test } from 'vitest';
import { hourMarks, nightScale, placeLane, slotHeight, twilight } from './night-layout.ts';

const night = { from: '2026-02-12T16:00:00Z', to: '2026-02-13T07:00:00Z', timeZone: 'Europe/Berlin' };
const scale = nightScale(night, 100, 1600);
type Bar = Night['lanes'][number]['bars'][number];
const bar = (from: string, to: string, slots: number): Bar => ({
  submissionId: null,
  title: null,
  state: 'done',
  from: `2026-02-12T${from}:00Z`,
  to: `2026-02-12T${to}:00Z`,
  slots,
});
const lane = (...bars: Bar[]) => ({ label: 'you', name: null, mine: true, bars });

test('time runs linearly from dusk to dawn and is held inside', () => {
  expect(scale.x(night.from)).toBe(100);
  expect(scale.x('2026-02-12T23:30:00Z')).toBe(850);
  expect(scale.x('2026-02-14T00:00:00Z')).toBe(1600);
});

test('hours are those of the group’s clock, labelled as far apart as they need', () => {
  const marks = hourMarks(night, 1500, 40);
  expect(marks.map((mark) => mark.label)).toEqual([
    '17',
    '18',
    '19',
    '20',
    '21',
    '22',
    '23',
    '00',
    '01',
    '02',
    '03',
    '04',
    '05',
    '06',
    '07',
    '08',
  ]);
  const sparse = hourMarks(night, 300, 44).filter((mark) => mark.labelled);
  expect(sparse.map((mark) => mark.label)).toEqual(['18', '21', '00', '03', '06']);
});

test('a zone half an hour off has its own whole hours', () => {
  const marks = hourMarks({ ...night, timeZone: 'Asia/Kolkata' }, 1500, 40);
  expect(new Date(marks[0]?.at ?? 0).toISOString()).toBe('2026-02-12T16:30:00.000Z');
});

test('area is CPU time: height is slots times one scale', () => {
  const { bars } = placeLane(lane(bar('18:00', '20:00', 4), bar('20:00', '21:00', 8)), scale, 2.5);
  expect(bars.map(({ height, width, offset }) => [height, width, offset])).toEqual([
    [10, 200, 0],
    [20, 100, 0],
  ]);
});

test('bars at the same time stand on each other', () => {
  const placed = placeLane(
    lane(bar('18:00', '22:00', 4), bar('19:00', '20:00', 2), bar('21:00', '23:00', 2)),
    scale,
    2,
  );
  expect(placed.bars.map(({ offset }) => offset)).toEqual([0, 8, 8]);
  expect(placed.height).toBe(12);
});

test('a machine of two slots has bars that can be seen', () => {
  expect(slotHeight(32)).toBe(2.2);
  expect(slotHeight(2) * 2).toBe(16);
});

test('twilight follows the night window, and by day the strip begins with day', () => {
  const window = { from: '2026-02-12T19:00:00Z', to: '2026-02-13T05:00:00Z', open: false };
  const sky = twilight({ from: '2026-02-12T11:00:00Z', to: '2026-02-13T07:00:00Z', window });
  expect(sky.map(({ step }) => step)).toEqual([1, 2, 3, 4, 3, 2, 1]);
  expect(sky[0]?.from).toBe(Date.parse('2026-02-12T11:00:00Z'));
  expect(sky[3]?.from).toBe(Date.parse('2026-02-12T18:40:00Z'));
  for (let i = 1; i < sky.length; i++) expect(sky[i]?.from).toBe(sky[i - 1]?.to);
});
