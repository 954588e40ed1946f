import fc from 'fast-check';
import { describe, expect, test } from 'vitest';
import { nightWindow } from '../night/night-window.ts';
import { type ForecastSettings, forecast, type OpenWork } from './forecast.ts';
import { shareSlots } from './share-slots.ts';

const minute = 60_000;
const settings: ForecastSettings = {
  now: new Date('2026-02-12T12:00:00Z'),
  slots: 2,
  people: new Map(),
  nightAt: (at) => nightWindow(at, { timeZone: 'UTC', nightFrom: '20:00', nightTo: '06:00' }),
  horizon: new Date('2026-02-14T12:00:00Z'),
};
const work = (given: Partial<OpenWork>): OpenWork => ({
  submissionId: 's',
  accountId: 'a',
  when: 'now',
  paused: false,
  priority: 0,
  createdAt: new Date('2026-02-12T11:00:00Z'),
  remainingMs: 60 * minute,
  partMs: 2000,
  done: 0,
  ...given,
});
const endOf = (open: OpenWork[], id: string, more: Partial<ForecastSettings> = {}) =>
  forecast(open, { ...settings, ...more })
    .ends.get(id)
    ?.at.toISOString();

describe('forecast', () => {
  test('one sweep alone takes its CPU time divided by the slots', () => {
    expect(endOf([work({})], 's')).toBe('2026-02-12T12:30:00.000Z');
  });
  test('a cap leaves slots to nobody when nobody else waits', () => {
    const people = new Map([['a', { weight: 1, maxSlots: 1 }]]);
    expect(endOf([work({})], 's', { people })).toBe('2026-02-12T13:00:00.000Z');
  });
  test('two people share, and the longer one takes over what the other leaves', () => {
    const open = [work({}), work({ submissionId: 't', accountId: 'b', remainingMs: 30 * minute })];
    expect(endOf(open, 't')).toBe('2026-02-12T12:30:00.000Z');
    expect(endOf(open, 's')).toBe('2026-02-12T12:45:00.000Z');
  });
  test('a weight of three gets three quarters', () => {
    const people = new Map([['b', { weight: 3, maxSlots: 2 }]]);
    const open = [work({}), work({ submissionId: 't', accountId: 'b', remainingMs: 90 * minute })];
    expect(endOf(open, 't', { people })).toBe('2026-02-12T13:00:00.000Z');
  });
  test('one’s own work goes by priority, then age', () => {
    const later = work({ submissionId: 't', createdAt: new Date('2026-02-12T11:30:00Z') });
    expect(endOf([later, work({})], 't')).toBe('2026-02-12T13:00:00.000Z');
    expect(endOf([{ ...later, priority: 1 }, work({})], 't')).toBe('2026-02-12T12:30:00.000Z');
  });
  test('work for the night waits for the window, then comes before work for now', () => {
    const night = work({ submissionId: 't', accountId: 'b', when: 'tonight' });
    const long = work({ remainingMs: 24 * 60 * minute });
    expect(endOf([night, long], 't')).toBe('2026-02-12T20:30:00.000Z');
    expect(endOf([night, long], 's')).toBe('2026-02-13T00:30:00.000Z');
  });
  test('a night that is too short goes on in the next', () => {
    const bars = forecast([work({ when: 'tonight', remainingMs: 30 * 60 * minute })], settings).bars;
    expect(bars.map(({ from, to }) => [from.toISOString(), to.toISOString()])).toEqual([
      ['2026-02-12T20:00:00.000Z', '2026-02-13T06:00:00.000Z'],
      ['2026-02-13T20:00:00.000Z', '2026-02-14T01:00:00.000Z'],
    ]);
  });
  test('a job of one part fills one slot', () => {
    expect(endOf([work({ partMs: 60 * minute })], 's')).toBe('2026-02-12T13:00:00.000Z');
  });
  test('paused work, no slots and the horizon give no end', () => {
    expect(endOf([work({ paused: true })], 's')).toBeUndefined();
    expect(endOf([work({})], 's', { slots: 0 })).toBeUndefined();
    expect(endOf([work({ remainingMs: 1e12 })], 's')).toBeUndefined();
  });
  test('the error shrinks with what is done and does not count the wait', () => {
    const plusMinus = (given: Partial<OpenWork>) => forecast([work(given)], settings).ends.get('s')?.plusMinusS;
    expect(plusMinus({})).toBeCloseTo(0.3 * 1800);
    expect(plusMinus({ done: 1 })).toBeCloseTo(0.05 * 1800);
    expect(plusMinus({ when: 'tonight' })).toBeCloseTo(0.3 * 1800);
  });

  const anyWork = fc.record({
    submissionId: fc.uuid(),
    accountId: fc.constantFrom('a', 'b', 'c'),
    when: fc.constantFrom('now' as const, 'tonight' as const),
    remainingMs: fc.integer({ min: 1, max: 5 * 3_600_000 }),
    partMs: fc.integer({ min: 1, max: 3_600_000 }),
    priority: fc.integer({ min: 0, max: 2 }),
  });
  test('bars hold exactly the remaining work, never more slots than there are, night work only at night', () => {
    fc.assert(
      fc.property(fc.uniqueArray(anyWork, { selector: (w) => w.submissionId, maxLength: 8 }), (given) => {
        const open = given.map(work);
        const { bars, ends } = forecast(open, settings);
        for (const { submissionId, remainingMs, when } of open) {
          const mine = bars.filter((bar) => bar.submissionId === submissionId);
          const area = mine.reduce((sum, bar) => sum + bar.slots * (bar.to.getTime() - bar.from.getTime()), 0);
          // Ends are Dates, whole milliseconds on at most 2 slots; one rounding for each of the bars' ends.
          if (ends.has(submissionId)) expect(Math.abs(area - remainingMs)).toBeLessThan(2 * 2 * (bars.length + 1));
          if (when === 'tonight') for (const bar of mine) expect(settings.nightAt(bar.from).open).toBe(true);
        }
        for (const { from } of bars) {
          const held = bars.filter((bar) => bar.from <= from && bar.to > from);
          expect(held.reduce((sum, bar) => sum + bar.slots, 0)).toBeLessThan(2 + 1e-6);
        }
      }),
    );
  });
});

test('shares fill what people can use and no more', () => {
  const shares = shareSlots(8, [
    { key: 'a', weight: 1, most: 1 },
    { key: 'b', weight: 1, most: 100 },
    { key: 'c', weight: 2, most: 100 },
  ]);
  expect(shares.get('a')).toBe(1);
  expect(shares.get('b')).toBeCloseTo(7 / 3);
  expect(shares.get('c')).toBeCloseTo(14 / 3);
});
