import {
  addDecimals,
  type Decimal,
  decimalNumber,
  decimalText,
  divideDecimals,
  multiplyDecimals,
  parseDecimal,
  shiftDecimal,
  subtractDecimals,
} from './decimal.ts';
import type { AxisValue } from './fields.ts';
import { allowedUnits, parseUnit } from './unit.ts';

/** A text that was read, or why it was not, in words. */
export type Read<T> = { ok: true; value: T } | { ok: false; message: string };

const quantityPattern = /^([+\-−]?[\d.]+(?:[eE][+\-−]?\d+)?)\s*(.*)$/;

/**
 * A quantity as people type it, in `unit`: `0.5 meV` for eV is the decimal 0.0005. A bare number is in `unit` already.
 * Exact: the shift by powers of ten happens in the decimal text.
 */
export function parseQuantity(text: string, unit: string): Read<Decimal> {
  const typed = text.trim();
  if (typed === '') return { ok: false, message: 'A number is missing.' };
  if (/^[+\-−]?\d+,\d+/.test(typed)) return { ok: false, message: `“${typed}”: write a decimal point, not a comma.` };
  const [, figures = '', suffix = ''] = quantityPattern.exec(typed) ?? [];
  const decimal = parseDecimal(figures.replaceAll('−', '-'));
  if (decimal === undefined) return { ok: false, message: `“${typed}” is no number.` };
  if (suffix === '') return { ok: true, value: decimal };
  const given = parseUnit(suffix);
  const wanted = parseUnit(unit);
  if (given === undefined || wanted === undefined || given.dimension !== wanted.dimension)
    return { ok: false, message: unitMessage(suffix, unit, given !== undefined) };
  return { ok: true, value: shiftDecimal(decimal, given.powerOfTen - wanted.powerOfTen) };
}

function unitMessage(suffix: string, unit: string, isUnit: boolean): string {
  const allowed = allowedUnits(unit);
  const instead = allowed.length === 0 ? 'this is a bare number without unit' : `use ${allowed.join(', ')}`;
  return isUnit ? `“${suffix}” is another kind of unit; ${instead}.` : `“${suffix}” is no unit known here; ${instead}.`;
}

/** The double that a typed quantity stands for. */
export function parseNumber(text: string, unit: string): Read<number> {
  const read = parseQuantity(text, unit);
  if (!read.ok) return read;
  const value = Number(decimalText(read.value));
  return Number.isFinite(value)
    ? { ok: true, value: value === 0 ? 0 : value }
    : { ok: false, message: `“${text.trim()}” is beyond the range of numbers.` };
}

/** Start, stop and count of a range whose ends are exact decimals. */
export interface DecimalRange {
  start: Decimal;
  stop: Decimal;
  count: number;
}

const rangePattern = /^(.+?)\s*(?:\.\.|…)\s*(.+?)\s*\/\s*(\d+)$/;

/** Does the text look like a range (`0..20 T / 401`)? */
export const isRangeText = (text: string) => /\.\.|…/.test(text);

/**
 * Reads `0..20 / 401`, `0..20 T / 401` or `-50 meV..50 meV / 11`. A unit after the second end only counts for both.
 * `maxCount` is refused by name, without making any value.
 */
export function parseRange(text: string, unit: string, maxCount: number): Read<DecimalRange> {
  const match = rangePattern.exec(text.trim());
  if (!match) return { ok: false, message: 'A range reads start..stop / count, e.g. 0..20 / 401.' };
  const [, first = '', last = '', figures = ''] = match;
  const suffix = /^[+\-−]?[\d.]+(?:[eE][+\-−]?\d+)?$/.test(first) ? (quantityPattern.exec(last)?.[2] ?? '') : '';
  const start = parseQuantity(suffix === '' ? first : `${first} ${suffix}`, unit);
  const stop = parseQuantity(last, unit);
  if (!start.ok) return start;
  if (!stop.ok) return stop;
  const count = Number(figures);
  if (count < 2) return { ok: false, message: `A range of ${figures} points; it needs at least 2.` };
  if (count > maxCount) return { ok: false, message: `A range of ${figures} points; at most ${maxCount} are allowed.` };
  return { ok: true, value: { start: start.value, stop: stop.value, count } };
}

/** What people type into an axis field: a number, a range, or values separated by commas or spaces with commas. */
export function parseAxis(text: string, unit: string, maxCount: number): Read<AxisValue> {
  if (isRangeText(text)) {
    const range = parseRange(text, unit, maxCount);
    if (!range.ok) return range;
    const { start, stop, count } = range.value;
    return { ok: true, value: { kind: 'range', start: decimalNumber(start), stop: decimalNumber(stop), count } };
  }
  if (!/[;,]\s/.test(text) && !text.includes(';')) return parseNumber(text, unit);
  const values: number[] = [];
  for (const part of text.split(/;|,\s/)) {
    const read = parseNumber(part, unit);
    if (!read.ok) return read;
    values.push(read.value);
  }
  return { ok: true, value: { kind: 'values', values } };
}

/**
 * Value i of a range of exact decimals: start + (stop − start)·i / (count − 1), exact where that is a finite decimal,
 * else rounded half to even to 17 significant digits from the exact fraction; the last is exactly stop. The same
 * fraction gives the same text whatever the range, so nested ranges share every common point.
 */
export function rangeValue({ start, stop, count }: DecimalRange, i: number): Decimal {
  const last = count - 1;
  if (i === last) return stop;
  const integer = (n: number): Decimal => ({ digits: BigInt(n), exponent: 0 });
  // one fraction over a common denominator, so that the sum is exact before it is rounded
  const scaledStart = multiplyDecimals(start, integer(last));
  const step = multiplyDecimals(subtractDecimals(stop, start), integer(i));
  return divideDecimals(addDecimals(scaledStart, step), integer(last));
}

/** All values of a decimal range as doubles, each parsed once from its decimal text. */
export function rangeValues(range: DecimalRange): number[] {
  return Array.from({ length: range.count }, (_, i) => decimalNumber(rangeValue(range, i)));
}
