import fc from 'fast-check';
import { describe, expect, test } from 'vitest';
import { lastNight, nightWindow, weekOf } from './night-window.ts';
import { instantOf, offsetMs } from './zoned-time.ts';

const berlin = { timeZone: 'Europe/Berlin', nightFrom: '20:00', nightTo: '07:00' };
const hours = ({ from, to }: { from: Date; to: Date }) => (to.getTime() - from.getTime()) / 3_600_000;

// Clock changes of the European Union in 2026: 29 March 01:00 UTC and 25 October 01:00 UTC (public law, 2000/84/EC).
describe('night window in Europe/Berlin', () => {
  test('an ordinary night', () => {
    const night = nightWindow(new Date('2026-02-12T22:42:00Z'), berlin);
    expect(night).toEqual({
      from: new Date('2026-02-12T19:00:00Z'),
      to: new Date('2026-02-13T06:00:00Z'),
      open: true,
    });
  });
  test('by day it is the coming night', () => {
    const night = nightWindow(new Date('2026-02-12T11:00:00Z'), berlin);
    expect(night).toMatchObject({ from: new Date('2026-02-12T19:00:00Z'), open: false });
  });
  test('after midnight it is still last evening’s', () => {
    expect(nightWindow(new Date('2026-02-13T05:59:59Z'), berlin)).toMatchObject({
      from: new Date('2026-02-12T19:00:00Z'),
      open: true,
    });
    expect(nightWindow(new Date('2026-02-13T06:00:00Z'), berlin)).toMatchObject({
      from: new Date('2026-02-13T19:00:00Z'),
      open: false,
    });
  });
  test('the spring change makes it ten hours', () => {
    const night = nightWindow(new Date('2026-03-29T00:30:00Z'), berlin);
    expect(night).toEqual({
      from: new Date('2026-03-28T19:00:00Z'),
      to: new Date('2026-03-29T05:00:00Z'),
      open: true,
    });
    expect(hours(night)).toBe(10);
  });
  test('the autumn change makes it twelve hours', () => {
    const night = nightWindow(new Date('2026-10-25T01:30:00Z'), berlin);
    expect(night).toEqual({
      from: new Date('2026-10-24T18:00:00Z'),
      to: new Date('2026-10-25T06:00:00Z'),
      open: true,
    });
    expect(hours(night)).toBe(12);
  });
  test('last night is over', () => {
    expect(lastNight(new Date('2026-10-25T08:00:00Z'), berlin).to).toEqual(new Date('2026-10-25T06:00:00Z'));
    expect(lastNight(new Date('2026-10-25T22:00:00Z'), berlin).to).toEqual(new Date('2026-10-25T06:00:00Z'));
  });
  test('a window inside one day', () => {
    const siesta = { ...berlin, nightFrom: '01:00', nightTo: '05:30' };
    expect(nightWindow(new Date('2026-02-12T12:00:00Z'), siesta)).toEqual({
      from: new Date('2026-02-13T00:00:00Z'),
      to: new Date('2026-02-13T04:30:00Z'),
      open: false,
    });
  });
});

test('a wall time that spring leaves out is read with the offset before it', () => {
  const wall = { year: 2026, month: 3, day: 29, minutes: 150 };
  expect(instantOf(wall, 'Europe/Berlin')).toEqual(new Date('2026-03-29T01:30:00Z'));
});
test('a wall time that autumn shows twice is the second', () => {
  const wall = { year: 2026, month: 10, day: 25, minutes: 150 };
  expect(instantOf(wall, 'Europe/Berlin')).toEqual(new Date('2026-10-25T01:30:00Z'));
});
test('zones that are not whole hours from UTC', () => {
  expect(offsetMs(Date.UTC(2026, 0, 1), 'Asia/Kathmandu')).toBe((5 * 60 + 45) * 60_000);
});

test('the week runs from Monday to Monday, through a clock change', () => {
  const week = weekOf(new Date('2026-10-24T12:00:00Z'), 'Europe/Berlin');
  expect(week).toEqual({ from: new Date('2026-10-18T22:00:00Z'), to: new Date('2026-10-25T23:00:00Z') });
  expect(hours(week)).toBe(169);
});

test('at any instant the window ends later, and the night before it has ended', () => {
  fc.assert(
    fc.property(
      fc.date({ min: new Date('2020-01-01'), max: new Date('2035-01-01'), noInvalidDate: true }),
      fc.constantFrom('Europe/Berlin', 'America/St_Johns', 'Australia/Lord_Howe', 'UTC', 'Asia/Tokyo'),
      (now, timeZone) => {
        const settings = { ...berlin, timeZone };
        const night = nightWindow(now, settings);
        const last = lastNight(now, settings);
        return night.to > now && last.to <= now && last.to <= night.from && night.open === night.from <= now;
      },
    ),
  );
});
