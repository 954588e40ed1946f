import { addDecimals, type Decimal, decimalText, parseDecimal } from '@nightcone/models';

/** One unit of the last digit typed, ten with Shift: exact, and the unit behind the number stays. */
export function stepText(text: string, direction: 1 | -1, big: boolean, integer: boolean): string | null {
  const match = /^\s*([+\-−]?[\d.]+(?:[eE][+\-−]?\d+)?)(\s*[^\d\s.,;/][^.,;/]*)?\s*$/.exec(text);
  if (!match) return null;
  const [, figures = '', unit = ''] = match;
  const value = parseDecimal(figures.replaceAll('−', '-'));
  if (!value) return null;
  const [mantissa = '', power = '0'] = figures.toLowerCase().split('e');
  const places = (mantissa.split('.')[1] ?? '').length;
  const exponent = integer ? 0 : Number(power.replace('−', '-')) - places;
  const step: Decimal = { digits: BigInt(direction), exponent: exponent + (big ? 1 : 0) };
  const sum = addDecimals(value, step);
  return `${fixed(sum, integer ? 0 : places, Number(power.replace('−', '-')))}${unit}`;
}

/** Keeps the number of decimals that was typed, so that the next step is of the same size. */
function fixed(decimal: Decimal, places: number, power: number): string {
  const text = decimalText(decimal);
  if (power !== 0 || text.includes('e') || places === 0) return text;
  const [whole = '0', decimals = ''] = text.split('.');
  return `${whole}.${decimals.padEnd(places, '0')}`;
}

/** A first range for a control that shall be swept: around its value, inside what is allowed. */
export function suggestRange(text: string, type: { type: string; min?: number; max?: number }): string {
  const value = Number.parseFloat(text.replace('−', '-')) || 0;
  const unit = /[a-zA-Zµ°Å].*$/.exec(text.replace(/^[^a-zA-Zµ°Å]*e[+-]?\d+/i, ''))?.[0] ?? '';
  const [low, high] = [type.min ?? Number.NEGATIVE_INFINITY, type.max ?? Number.POSITIVE_INFINITY];
  const clamp = (number: number) => Math.min(high, Math.max(low, number));
  if (type.type === 'integer') {
    const start = clamp(Math.round(value));
    const stop = clamp(start + 20);
    return `${start}..${stop} / ${Math.max(2, Math.min(21, stop - start + 1))}`;
  }
  const [start, stop] = value === 0 ? [clamp(0), clamp(10)] : [clamp(value / 2), clamp(value * 1.5)];
  const round = (number: number) => String(Number(number.toPrecision(3)));
  return `${round(Math.min(start, stop))}..${round(Math.max(start, stop))}${unit ? ` ${unit}` : ''} / 11`;
}
