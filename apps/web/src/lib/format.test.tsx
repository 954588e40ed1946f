import { describe, expect, test } from 'vitest';
import { cleanHash, shortHash } from './format-hash.ts';
import { formatBytes, formatCount, formatQuantity, formatSmall, plural } from './format-quantity.ts';
import { formatClock, formatCpu, formatDate, formatExact, formatMoment, formatUncertainty } from './format-time.ts';

describe('quantities', () => {
  test.each([
    [0.036302, 'eV', '36.302 meV'],
    [-0.5751, 'eV nm', '−0.5751 eV nm'],
    [100.1, 'nm', '100.1 nm'],
    [0.142, 'nm', '0.142 nm'],
    [12, 'T', '12 T'],
    [3.9e-6, 'eV', '3.9 µeV'],
    [0, 'eV', '0 eV'],
    [0.86, '1/nm', '0.86 1/nm'],
    [8e-13, 'eV', '8e−13 eV'],
  ])('%d %s reads %s', (value, unit, text) => {
    expect(formatQuantity(value, unit)).toBe(text);
  });

  test('sizes of errors have two figures', () => {
    expect(formatSmall(3.14e-13, 'eV')).toBe('3.1e−13 eV');
    expect(formatSmall(0, 'eV')).toBe('0 eV');
  });

  test('counts and bytes', () => {
    expect(formatCount(1184)).toBe('1\u2009184');
    expect(plural(1, 'job')).toBe('1 job');
    expect(plural(3, 'job')).toBe('3 jobs');
    expect(formatBytes(31_000_000)).toBe('31 MB');
    expect(formatBytes(4_120_000)).toBe('4.1 MB');
    expect(formatBytes(0)).toBe('0 B');
  });
});

describe('times', () => {
  const zone = 'Europe/Berlin';
  test('are in the group’s zone, whatever the browser’s', () => {
    expect(formatClock('2026-02-12T22:42:00Z', zone)).toBe('23:42');
    expect(formatClock('2026-02-12T23:30:00Z', zone)).toBe('00:30');
    expect(formatDate('2026-02-12T23:30:00Z', zone)).toBe('2026-02-13');
    expect(formatExact('2026-02-12T22:42:07Z', zone)).toBe('2026-02-12 23:42:07 Europe/Berlin');
  });
  test('name the day only when it is another one', () => {
    const now = new Date('2026-02-12T12:00:00Z');
    expect(formatMoment('2026-02-12T22:42:00Z', zone, now)).toBe('23:42');
    expect(formatMoment('2026-02-14T22:42:00Z', zone, now)).toBe('Sat 23:42');
    expect(formatMoment('2026-04-14T22:42:00Z', zone, now)).toBe('2026-04-15 00:42');
  });
  test.each([
    [420, '420 CPU-ms'],
    [5800, '5.8 CPU-s'],
    [846_000, '14.1 CPU-min'],
    [22_320_000, '6.2 CPU-h'],
    [0, '0 CPU-s'],
  ])('%d ms of CPU reads %s', (ms, text) => {
    expect(formatCpu(ms)).toBe(text);
  });
  test('uncertainties are rounded up', () => {
    expect(formatUncertainty(12)).toBe('± 12 s');
    expect(formatUncertainty(691)).toBe('± 12 min');
    expect(formatUncertainty(7300)).toBe('± 3 h');
  });
});

describe('hashes', () => {
  const hash = '7f3a9c2104be'.padEnd(64, '0');
  test('are grouped short and read back', () => {
    expect(shortHash(hash)).toBe('7f3a·9c21·04be');
    expect(cleanHash(' 7F3A·9c21·04be ')).toBe('7f3a9c2104be');
    expect(cleanHash(`sha256:${hash}`)).toBe(hash);
  });
});
