import { displayUnit } from './axis-unit.ts';

/** Numbers for people: a sensible prefix, as many digits as the error supports, and the error. */

const minus = (text: string) => text.replace(/^-/, '−').replace(/e-/, 'e−').replace(/e\+/, 'e');

/** Figures beyond which nobody reads on: the value is then shown to this many, without its far smaller error. */
const mostFigures = 10;

/** Fixed or scientific, whichever is shorter to read; a real minus sign; no padding with zeros. */
export function formatNumber(value: number, digits = 4): string {
  if (!Number.isFinite(value)) return '–';
  if (value === 0) return '0';
  const size = Math.abs(value);
  if (size >= 1e6 || size < 1e-4) {
    const [mantissa, exponent] = value.toExponential(Math.max(0, digits - 1)).split('e') as [string, string];
    return minus(`${mantissa.includes('.') ? mantissa.replace(/\.?0+$/, '') : mantissa}e${exponent}`);
  }
  const decimals = Math.max(0, digits - 1 - Math.floor(Math.log10(size)));
  const text = value.toFixed(Math.min(20, decimals));
  return minus(text.includes('.') ? text.replace(/\.?0+$/, '') : text);
}

/**
 * `226.406(4)`: the value to the digit of its error, the error's first digit in brackets (two when it is 1), rounded
 * up so that the text never claims more than the number. Without an error, five significant digits.
 */
export function formatWithError(value: number, error: number | null | undefined): string {
  if (!Number.isFinite(value)) return '–';
  if (error === null || error === undefined || !(error > 0)) return formatNumber(value, 5);
  const [first, power] = error.toExponential(0).split('e') as [string, string];
  const places = -Number(power) + (first === '1' ? 1 : 0);
  const figures = places + 1 + Math.floor(Math.log10(Math.max(Math.abs(value), error)));
  if (figures > mostFigures) return formatNumber(value, mostFigures);
  if (places <= 0) {
    const unit = 10 ** -places;
    return minus(`${(Math.round(value / unit) * unit).toFixed(0)}(${(Math.ceil(error / unit) * unit).toFixed(0)})`);
  }
  return minus(`${value.toFixed(places)}(${Math.ceil(error * 10 ** places - 1e-9)})`);
}

/** Value, error and unit in one text, with a prefix chosen by the value (or by its error where the value is smaller). */
export function formatQuantity(value: number, unit: string, error?: number | null): string {
  const shown = displayUnit(unit, Math.max(Math.abs(value), error ?? 0));
  const number = formatWithError(value * shown.factor, error ? error * shown.factor : null);
  return shown.unit ? `${number} ${shown.unit}` : number;
}

/** The size of an error or residual: two figures with a prefix, a power of ten where it is far below one. */
export function formatSize(value: number, unit: string): string {
  const shown = displayUnit(unit, value);
  const scaled = value * shown.factor;
  const size = Math.abs(scaled);
  const number = size > 0 && size < 0.1 ? minus(value.toExponential(1)) : formatNumber(scaled, 2);
  const named = size > 0 && size < 0.1 ? unit : shown.unit;
  return named ? `${number} ${named}` : number;
}
