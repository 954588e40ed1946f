import type { Json } from './fields.ts';

export interface AxisExtent {
  least: number;
  most: number;
  /** Largest distance from 0, and the smallest one above 0 (0 when every value is 0). */
  largest: number;
  smallest: number;
}

/** What the values of an axis span, without making them; exact in browser and server alike. */
export function axisExtent(axis: Json | undefined): AxisExtent {
  const values = spanningValues(axis);
  const sizes = values.map((value) => (value < 0 ? -value : value));
  const nonZero = sizes.filter((size) => size > 0);
  return {
    least: Math.min(...values),
    most: Math.max(...values),
    largest: Math.max(...sizes),
    smallest: nonZero.length === 0 ? 0 : Math.min(...nonZero),
  };
}

/** The ends of a range and, where it crosses 0, the points next to 0; all values of a list. Never empty. */
function spanningValues(axis: Json | undefined): number[] {
  if (typeof axis === 'number') return [axis];
  if (typeof axis !== 'object' || axis === null || Array.isArray(axis)) return [0];
  if (Array.isArray(axis.values)) return axis.values.length === 0 ? [0] : axis.values.map(Number);
  const start = Number(axis.start ?? 0);
  const stop = Number(axis.stop ?? 0);
  const intervals = Number(axis.count ?? 2) - 1;
  if (!(intervals > 1)) return [start, stop];
  const step = (stop - start) / intervals;
  const near = step === 0 ? 0 : Math.floor(-start / step);
  const points = [start, stop];
  for (const i of [near - 1, near, near + 1]) {
    if (i > 0 && i < intervals) points.push(start + step * i);
  }
  return points;
}
