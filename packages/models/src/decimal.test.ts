import fc from 'fast-check';
import { describe, expect, test } from 'vitest';
import {
  addDecimals,
  decimalNumber,
  decimalOf,
  decimalText,
  divideDecimals,
  multiplyDecimals,
  parseDecimal,
  shiftDecimal,
  subtractDecimals,
} from './decimal.ts';

const decimal = (text: string) => {
  const parsed = parseDecimal(text);
  if (!parsed) throw new Error(`${text} was not read`);
  return parsed;
};
const doubles = fc.double({ noNaN: true, noDefaultInfinity: true });

test.each([
  ['0.9', '0.9'],
  ['1e-3', '0.001'],
  ['.5', '0.5'],
  ['5.', '5'],
  ['+2.50', '2.5'],
  ['−3', '-3'],
  ['-0', '0'],
  ['1e21', '1e21'],
  ['123456789012345678901234e-30', '1.23456789012345678901234e-7'],
  ['1200', '1200'],
])('%s is read as %s', (text, canonical) => {
  expect(decimalText(decimal(text))).toBe(canonical);
});

test.each(['', '.', 'e5', '1e', '0x10', '1 2', '1,5', 'NaN', 'Infinity', '1e99999', '--1'])(
  '%j is no decimal',
  (text) => {
    expect(parseDecimal(text)).toBeUndefined();
  },
);

test('every double survives its decimal', () => {
  fc.assert(fc.property(doubles, (value) => Object.is(decimalNumber(decimalOf(value)), value === 0 ? 0 : value)));
});

test('a shift of the text is the double of the shifted text: 0.9 meV = 0.0009 eV', () => {
  fc.assert(
    fc.property(
      fc.integer({ min: -999_999_999, max: 999_999_999 }),
      fc.integer({ min: -6, max: 9 }),
      (digits, places) => {
        const typed = decimal(`${digits}e-6`);
        return Object.is(decimalNumber(shiftDecimal(typed, places)), Number(`${digits}e${places - 6}`) + 0);
      },
    ),
  );
  // 260 of the 999 values from 0.1 to 99.9 would be another double if they were multiplied
  const naive = Array.from({ length: 999 }, (_, i) => `${(i + 1) / 10}`).filter(
    (text) => Number(text) * 1e-3 !== decimalNumber(shiftDecimal(decimal(text), -3)),
  );
  expect(naive.length).toBe(260);
});

test('sums and products are exact', () => {
  expect(decimalText(addDecimals(decimal('0.1'), decimal('0.2')))).toBe('0.3');
  expect(decimalText(subtractDecimals(decimal('1e20'), decimal('1e-5')))).toBe('99999999999999999999.99999');
  expect(decimalText(multiplyDecimals(decimal('0.6'), decimal('0.6582119569509067')))).toBe('0.39492717417054402');
});

describe('quotients', () => {
  test('that are finite decimals are exact', () => {
    expect(decimalText(divideDecimals(decimal('1'), decimal('8')))).toBe('0.125');
    expect(decimalText(divideDecimals(decimal('-3'), decimal('0.0625')))).toBe('-48');
    expect(decimalText(divideDecimals(decimal('1'), decimal('1024')))).toBe('0.0009765625');
    expect(decimalText(divideDecimals(decimal('0'), decimal('7')))).toBe('0');
  });

  test('that are not are rounded to 17 digits, half to even', () => {
    expect(decimalText(divideDecimals(decimal('1'), decimal('3')))).toBe('0.33333333333333333');
    expect(decimalText(divideDecimals(decimal('2'), decimal('3')))).toBe('0.66666666666666667');
    expect(decimalText(divideDecimals(decimal('-20'), decimal('7')))).toBe('-2.8571428571428571');
    expect(decimalText(divideDecimals(decimal('1e9'), decimal('3e-9')))).toBe('333333333333333330');
  });

  test('lie within half a unit of the 17th digit of the fraction', () => {
    const positive = fc.bigInt({ min: 1n, max: 10n ** 25n });
    fc.assert(
      fc.property(positive, positive, (a, b) => {
        const { digits, exponent } = divideDecimals({ digits: a, exponent: 0 }, { digits: b, exponent: 0 });
        // | digits·10^e·b − a | ≤ b · 10^(e of the 17th digit) / 2
        const figures = String(digits).length;
        const unit = exponent - (17 - figures);
        const power = unit < 0 ? 10n ** BigInt(-unit) : 1n;
        const lift = unit > 0 ? 10n ** BigInt(unit) : 1n;
        const shown =
          exponent - unit >= 0 ? digits * 10n ** BigInt(exponent - unit) : digits / 10n ** BigInt(unit - exponent);
        const error = shown * lift * b - a * power;
        return figures > 17 || 2n * (error < 0n ? -error : error) <= b * lift;
      }),
    );
  });

  test('by zero are refused', () => {
    expect(() => divideDecimals(decimal('1'), decimal('0'))).toThrow(/zero/);
  });
});

test('beyond the doubles is refused, below them is 0', () => {
  expect(() => decimalNumber(decimal('1e400'))).toThrow(/beyond/);
  expect(Object.is(decimalNumber(decimal('-1e-400')), 0)).toBe(true);
});
