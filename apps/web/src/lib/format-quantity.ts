import { displayUnit, formatNumber } from '@nightcone/drawing';

export { formatNumber };

/** `formatQuantity(0.036302, 'eV')` → 36.302 meV. Values with an error: formatQuantity of the drawings. */
export function formatQuantity(value: number, unit: string, digits = 6): string {
  const shown = displayUnit(unit, value);
  return withUnit(formatNumber(value * shown.factor, digits), shown.unit);
}

/** Sizes of errors and residuals, `3.1e−13 eV`: two figures, no prefix. */
export function formatSmall(value: number, unit: string): string {
  const size = Math.abs(value);
  const plain = size === 0 || (size >= 1e-3 && size < 1e6);
  return withUnit(
    plain ? formatNumber(value, 3) : value.toExponential(1).replaceAll('-', '−').replace('e+', 'e'),
    unit,
  );
}

const withUnit = (number: string, unit: string) => (unit ? `${number} ${unit}` : number);

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
