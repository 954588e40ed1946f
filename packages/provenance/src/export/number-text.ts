/**
 * A number with up to 17 significant digits: reads back as the same double everywhere, `-0` too. JSON and CSV share it.
 */
export function numberText(value: number): string {
  if (Number.isInteger(value) && value < 1e15 && value > -1e15) return Object.is(value, -0) ? '-0' : String(value);
  const [mantissa = '', exponent] = value.toPrecision(17).split('e');
  const trimmed = mantissa.includes('.') ? mantissa.replace(/\.?0+$/, '') : mantissa;
  return exponent === undefined ? trimmed : `${trimmed}e${exponent}`;
}
