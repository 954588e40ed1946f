import fc from 'fast-check';
import { describe, expect, test } from 'vitest';
import { decimalText, parseDecimal } from './decimal.ts';
import { parseAxis, parseNumber, parseQuantity, parseRange, rangeValue, rangeValues } from './quantity.ts';
import { parseUnit } from './unit.ts';

const accepted = <T>(read: { ok: true; value: T } | { ok: false; message: string }): T => {
  if (!read.ok) throw new Error(read.message);
  return read.value;
};
const refusal = (read: { ok: boolean; message?: string }) => (read.ok ? 'was accepted' : read.message);

test.each([
  ['1e-3', 'eV', '0.001'],
  ['0.9 meV', 'eV', '0.0009'],
  ['0.5meV', 'eV', '0.0005'],
  ['3 ueV', 'eV', '0.000003'],
  ['3 μeV', 'eV', '0.000003'],
  ['20 nm', 'nm', '20'],
  ['1.42 Å', 'nm', '0.142'],
  ['1.42 Å', 'nm', '0.142'],
  ['2 µm', 'nm', '2000'],
  ['12 T', 'T', '12'],
  ['250 mT', 'T', '0.25'],
  ['0.1 1/Å', '1/nm', '1'],
  ['0.1 Å⁻¹', '1/nm', '1'],
  ['0.1 Å^-1', '1/nm', '1'],
  ['5e12 cm^-2', '1/nm²', '0.05'],
  ['1e12 1/cm²', '1/nm²', '0.01'],
  ['5.75 eV·Å', 'eV nm', '0.575'],
  ['1 meV/Å', 'eV/nm', '0.01'],
  ['90 °', 'deg', '90'],
  ['−4 K', 'K', '-4'],
  ['7', '', '7'],
])('%s for a field in %s is %s', (text, unit, value) => {
  expect(decimalText(accepted(parseQuantity(text, unit)))).toBe(value);
});

test.each([
  ['12 K', 'T', /“K” is another kind of unit; use T, mT\./],
  ['12 gauss', 'T', /“gauss” is no unit known here; use T, mT\./],
  ['12 nm', '1/nm', /another kind of unit; use 1\/nm, 1\/Å, 1\/µm\./],
  ['3 T', '', /bare number without unit/],
  ['abc', 'T', /“abc” is no number/],
  ['', 'T', /missing/],
  ['1,5 T', 'T', /decimal point/],
  ['1.2.3', 'T', /no number/],
])('%j for a field in %s is refused in words', (text, unit, message) => {
  expect(refusal(parseQuantity(text, unit))).toMatch(message);
});

test('a number beyond the doubles is refused', () => {
  expect(refusal(parseNumber('1e999', 'eV'))).toMatch(/beyond/);
  expect(Object.is(accepted(parseNumber('-0', 'eV')), 0)).toBe(true);
});

test.each(['eV', 'nm', '1/nm', '1/nm²', 'eV nm', 'eV/nm', 'T', 'K', 'deg', 'rad', ''])(
  'the unit %j of fields is known',
  (unit) => {
    expect(parseUnit(unit)?.powerOfTen).toBe(0);
  },
);

test('0.9 meV and 0.0009 eV are the same double, for every prefix', () => {
  fc.assert(
    fc.property(fc.integer({ min: 1, max: 99_999 }), fc.integer({ min: 0, max: 4 }), (digits, places) => {
      const typed = decimalText({ digits: BigInt(digits), exponent: -places });
      const shifted = decimalText({ digits: BigInt(digits), exponent: -places - 3 });
      return accepted(parseNumber(`${typed} meV`, 'eV')) === Number(shifted);
    }),
  );
});

describe('ranges', () => {
  test('as typed', () => {
    const read = accepted(parseRange('0..20 / 401', 'T', 1000));
    expect([decimalText(read.start), decimalText(read.stop), read.count]).toEqual(['0', '20', 401]);
    expect(accepted(parseAxis('-50..50 meV / 11', 'eV', 99))).toEqual({
      kind: 'range',
      start: -0.05,
      stop: 0.05,
      count: 11,
    });
    expect(accepted(parseAxis('-50 meV … 0.1 eV/3', 'eV', 99))).toEqual({
      kind: 'range',
      start: -0.05,
      stop: 0.1,
      count: 3,
    });
    expect(accepted(parseAxis('1, 2.5, 4 T', 'T', 99))).toEqual({ kind: 'values', values: [1, 2.5, 4] });
    expect(accepted(parseAxis('12 T', 'T', 99))).toBe(12);
  });

  test('of 10⁹ points are refused by name, without making one', () => {
    expect(refusal(parseRange('0..1 / 1000000000', 'T', 20001))).toBe(
      'A range of 1000000000 points; at most 20001 are allowed.',
    );
    expect(refusal(parseRange('0..1 / 1', 'T', 20001))).toMatch(/at least 2/);
    expect(refusal(parseRange('0..1', 'T', 20001))).toMatch(/start..stop \/ count/);
    expect(refusal(parseRange('0..1 K / 5', 'T', 20001))).toMatch(/another kind/);
  });

  test('0 to 1 in tenths are the doubles of their texts', () => {
    const range = accepted(parseRange('0..1 / 11', 'T', 99));
    expect(rangeValues(range)).toEqual([0, 0.1, 0.2, 0.3, 0.4, 0.5, 0.6, 0.7, 0.8, 0.9, 1]);
  });

  test('end exactly at stop and begin at start, thirds between', () => {
    const range = accepted(parseRange('0..0.7 / 4', 'eV', 99));
    expect(rangeValues(range)).toEqual([0, Number('0.23333333333333333'), Number('0.46666666666666667'), 0.7]);
  });

  test('that are nested share every common point bit for bit', () => {
    const end = fc.integer({ min: -9999, max: 9999 });
    fc.assert(
      fc.property(end, end, fc.integer({ min: 1, max: 40 }), fc.integer({ min: 2, max: 7 }), (a, b, steps, finer) => {
        const start = parseDecimal(`${a}e-3`);
        const stop = parseDecimal(`${b}e-3`);
        if (!start || !stop) return false;
        const coarse = rangeValues({ start, stop, count: steps + 1 });
        const fine = rangeValues({ start, stop, count: steps * finer + 1 });
        return coarse.every((value, i) => Object.is(value, fine[i * finer]));
      }),
    );
  });

  test('cut in half share the points of the whole', () => {
    const range = accepted(parseRange('0.1..0.9 / 81', 'eV', 99));
    const half = accepted(parseRange('0.1..0.5 / 41', 'eV', 99));
    expect(rangeValues(half)).toEqual(rangeValues(range).slice(0, 41));
    expect(decimalText(rangeValue(range, 7))).toBe('0.17');
  });
});
