/** Numbers for people: a sensible prefix, as many digits as the error supports, and the error. */

const prefixes: [symbol: string, exponent: number][] = [
  ['p', -12],
  ['n', -9],
  ['µ', -6],
  ['m', -3],
  ['', 0],
  ['k', 3],
];
/** Units that take a prefix: the base, the power of ten that their name already carries, the largest prefix in use. */
const prefixed: Record<string, { base: string; rest: string; exponent: number; most: number }> = {
  eV: { base: 'eV', rest: '', exponent: 0, most: 3 },
  'eV nm': { base: 'eV', rest: ' nm', exponent: 0, most: 0 },
  'eV/nm': { base: 'eV', rest: '/nm', exponent: 0, most: 0 },
  nm: { base: 'm', rest: '', exponent: -9, most: 0 },
  T: { base: 'T', rest: '', exponent: 0, most: 0 },
  K: { base: 'K', rest: '', exponent: 0, most: 0 },
};

export interface Formatted {
  value: string;
  unit: string;
  /** Value and unit together. */
  text: string;
}

const minus = (text: string) => text.replaceAll('-', '−').replace('e+', 'e');
const join = (value: string, unit: string): Formatted => ({ value, unit, text: unit ? `${value} ${unit}` : value });

/** Smaller than this power of ten, `8.0e−13 eV` reads better than a rare prefix. */
const leastPrefix = -9;

function scale(value: number, unit: string): { factor: number; unit: string } {
  const known = prefixed[unit];
  if (!known || value === 0 || !Number.isFinite(value)) return { factor: 1, unit };
  const exponent = Math.floor(Math.log10(Math.abs(value)) + 1e-12) + known.exponent;
  const wanted = Math.min(known.most, 3 * Math.floor(exponent / 3));
  if (wanted < (known.base === 'm' ? -12 : leastPrefix)) return { factor: 1, unit };
  // 100 nm and 0.2 nm both read better in nm; other prefixes follow the size.
  const power = known.base === 'm' && wanted === -12 && exponent >= -11 ? -9 : wanted;
  const symbol = prefixes.find(([, each]) => each === power)?.[0] ?? '';
  return { factor: 10 ** (known.exponent - power), unit: `${symbol}${known.base}${known.rest}` };
}

/** At most `digits` significant figures, without trailing zeros; an exponent for very small and very large numbers. */
export function formatNumber(value: number, digits = 6): string {
  if (!Number.isFinite(value)) return Number.isNaN(value) ? 'not a number' : value > 0 ? '∞' : '−∞';
  if (value === 0) return '0';
  const size = Math.abs(value);
  if (size < 1e-4 || size >= 1e9) {
    return minus(value.toExponential(Math.min(digits, 4) - 1).replace(/\.?0+e/, 'e'));
  }
  const decimals = Math.max(0, Math.min(20, digits - 1 - Math.floor(Math.log10(size))));
  const fixed = value.toFixed(decimals);
  return minus(fixed.includes('.') ? fixed.replace(/\.?0+$/, '') : fixed);
}

/** `formatQuantity(0.036302, 'eV')` → 36.302 meV. */
export function formatQuantity(value: number, unit: string, digits = 6): Formatted {
  const { factor, unit: shown } = scale(value, unit);
  return join(formatNumber(value * factor, digits), shown);
}

/** Sizes of errors and residuals, `3.1e−13 eV`: two figures, no prefix. */
export function formatSmall(value: number, unit: string): Formatted {
  const size = Math.abs(value);
  const number = size > 0 && (size < 1e-3 || size >= 1e6) ? minus(value.toExponential(1)) : formatNumber(value, 3);
  return join(number, unit);
}

/**
 * Value with its error on the last figures: `formatWithError(0.0363021, 4e-6, 'eV')` → 36.302(4) meV. The error is
 * rounded up to one figure, so that the text never claims more than the number. Without an error: six figures.
 */
export function formatWithError(value: number, error: number | undefined, unit: string): Formatted {
  if (error === undefined || !(error > 0) || !Number.isFinite(error)) return formatQuantity(value, unit);
  const { factor, unit: shown } = scale(Math.max(Math.abs(value), error), unit);
  const scaledError = error * factor;
  let place = Math.floor(Math.log10(scaledError));
  let figure = Math.ceil(scaledError / 10 ** place - 1e-9);
  if (figure === 10) {
    figure = 1;
    place += 1;
  }
  const scaled = value * factor;
  if (place >= 0) {
    const step = 10 ** place;
    return join(`${minus(String(Math.round(scaled / step) * step))}(${figure * step})`, shown);
  }
  // Closed forms are right to the last bit; more figures than this say nothing to a reader.
  if (scaled !== 0 && Math.floor(Math.log10(Math.abs(scaled))) - place >= mostFigures) {
    return formatQuantity(value, unit, mostFigures);
  }
  return join(`${minus(scaled.toFixed(-place))}(${figure})`, shown);
}

const mostFigures = 9;

const counts = new Intl.NumberFormat('en', { maximumFractionDigits: 0 });
/** 1 184, with thin spaces between thousands. */
export const formatCount = (value: number): string => counts.format(value).replaceAll(',', '\u2009');

/** `plural(3, 'job')` → 3 jobs. */
export const plural = (count: number, word: string, many = `${word}s`): string =>
  `${formatCount(count)} ${count === 1 ? word : many}`;

/** 31 MB, powers of ten. */
export function formatBytes(bytes: number): string {
  const units = ['B', 'kB', 'MB', 'GB', 'TB'];
  const step = bytes < 1 ? 0 : Math.min(units.length - 1, Math.floor(Math.log10(bytes) / 3));
  const value = bytes / 1000 ** step;
  return `${value.toFixed(step > 0 && value < 10 ? 1 : 0)} ${units[step]}`;
}
