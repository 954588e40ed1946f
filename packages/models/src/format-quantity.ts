/**
 * A number for reading, never for computing: `digits` significant digits, a true minus sign, ×10ⁿ beyond 10⁵ or below
 * 10⁻³, whole numbers below a million in full, the unit after a no-break space (degrees without).
 */
export function formatQuantity(value: number, unit = '', digits = 4): string {
  const figures = formatNumber(value, digits);
  if (unit === '') return figures;
  return unit === 'deg' ? `${figures}°` : `${figures}\u00a0${unit}`;
}

/** The number alone, e.g. `−0.5`, `1.25×10⁻⁷`. */
export function formatNumber(value: number, digits = 4): string {
  if (!Number.isFinite(value)) return Number.isNaN(value) ? 'no number' : value > 0 ? '∞' : '−∞';
  if (value === 0) return '0';
  if (Number.isInteger(value) && value < 1e6 && value > -1e6) return String(value).replace('-', '−');
  const [mantissa = '', power = '0'] = value.toExponential(digits - 1).split('e');
  const exponent = Number(power);
  const plain = exponent >= -3 && exponent < Math.max(digits, 5);
  const text = plain ? String(Number(value.toPrecision(digits))) : trimZeros(mantissa);
  const signed = text.replace('-', '−');
  return plain ? signed : `${signed}×10${superscript(exponent)}`;
}

const trimZeros = (text: string) => (text.includes('.') ? text.replace(/\.?0+$/, '') : text);

const superscript = (exponent: number) =>
  [...String(exponent)].map((sign) => (sign === '-' ? '⁻' : '⁰¹²³⁴⁵⁶⁷⁸⁹'[Number(sign)])).join('');
