import type { KernelResult, ResultArrayData } from '@nightcone/kernel';
import { type ArrayValues, arrayValues, indexOf } from './array-values.ts';
import { canonicalJson } from './canonical.ts';

/** A largest difference and where it stands: an index along every number of the shape (of a ragged list, the entry). */
export interface LargestDifference {
  value: number;
  index: number[];
}

/** What two results say of one array. */
export type ArrayComparison =
  | { name: string; verdict: 'identical' }
  | { name: string; verdict: 'missing'; from: 'first' | 'second' }
  /** Another type, shape, dimensions or unit: the numbers cannot be compared one by one. */
  | { name: string; verdict: 'incomparable'; first: string; second: string }
  | {
      name: string;
      verdict: 'different';
      unit: string;
      /** How many numbers differ, of how many. */
      count: number;
      of: number;
      absolute: LargestDifference;
      /** |a − b| / max(|a|, |b|). */
      relative: LargestDifference;
      /** Representable doubles between the two (f64 only); at most 2⁵³. */
      ulps: LargestDifference | null;
    };

export interface ResultComparison {
  /** Every array and the certificate have the same bits. */
  identical: boolean;
  certificate: 'identical' | 'different';
  arrays: ArrayComparison[];
}

/** Compares two results bit for bit, array by array in the order of the first; what only one holds is named. */
export function compareResults(first: KernelResult, second: KernelResult): ResultComparison {
  const others = new Map(second.arrays.map((array) => [array.name, array]));
  const arrays = first.arrays.map((array) => {
    const other = others.get(array.name);
    others.delete(array.name);
    return other ? compareArrays(array, other) : missing(array.name, 'second');
  });
  arrays.push(...[...others.keys()].map((name) => missing(name, 'first')));
  const same = canonicalJson(first.certificate) === canonicalJson(second.certificate);
  return {
    identical: same && arrays.every(({ verdict }) => verdict === 'identical'),
    certificate: same ? 'identical' : 'different',
    arrays,
  };
}

const missing = (name: string, from: 'first' | 'second'): ArrayComparison => ({ name, verdict: 'missing', from });

const outline = ({ dtype, shape, dims, unit }: ResultArrayData) =>
  `${dtype} [${shape.join(', ')}] along ${dims.join(', ') || 'nothing'} ${unit}`.trimEnd();

export function compareArrays(first: ResultArrayData, second: ResultArrayData): ArrayComparison {
  const { name, unit, shape } = first;
  if (outline(first) !== outline(second))
    return { name, verdict: 'incomparable', first: outline(first), second: outline(second) };
  if (sameBytes(first.bytes, second.bytes)) return { name, verdict: 'identical' };
  const [a, b] = [arrayValues(first), arrayValues(second)];
  const found = largestDifferences(a, b);
  const place = ({ value, at }: { value: number; at: number }) => ({ value, index: indexOf(at, shape) });
  return {
    name,
    verdict: 'different',
    unit,
    count: found.count,
    of: a.length,
    absolute: place(found.absolute),
    relative: place(found.relative),
    ulps: first.dtype === 'f64' ? place(found.ulps) : null,
  };
}

function sameBytes(a: Uint8Array, b: Uint8Array): boolean {
  if (a.length !== b.length) return false;
  for (let i = 0; i < a.length; i++) if (a[i] !== b[i]) return false;
  return true;
}

function largestDifferences(a: ArrayValues, b: ArrayValues) {
  const absolute = { value: -1, at: 0 };
  const relative = { value: -1, at: 0 };
  const ulps = { value: -1, at: 0 };
  const raise = (largest: { value: number; at: number }, value: number, at: number) => {
    if (value > largest.value) Object.assign(largest, { value, at });
  };
  let count = 0;
  for (let i = 0; i < a.length; i++) {
    const [x, y] = [a[i] ?? 0, b[i] ?? 0];
    if (Object.is(x, y)) continue;
    count += 1;
    const distance = Math.abs(x - y);
    const size = Math.max(Math.abs(x), Math.abs(y));
    raise(absolute, distance, i);
    raise(relative, size > 0 ? distance / size : 0, i);
    raise(ulps, ulpDistance(x, y), i);
  }
  return { count, absolute, relative, ulps };
}

const scratch = new DataView(new ArrayBuffer(8));

/** Position of a double in the order of all doubles; 0 and -0 are neighbours' one place. */
function ordinal(value: number): bigint {
  scratch.setFloat64(0, value);
  const bits = scratch.getBigInt64(0);
  return bits >= 0n ? bits : -(bits & 0x7fff_ffff_ffff_ffffn);
}

/** How many steps from one representable double to the next lead from `a` to `b`. */
export function ulpDistance(a: number, b: number): number {
  const distance = ordinal(a) - ordinal(b);
  return Number(distance < 0n ? -distance : distance);
}
