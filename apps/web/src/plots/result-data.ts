import type { ArrayInfo } from '@nightcone/contracts';
import type { Json } from '@nightcone/models';

export type Values = Float64Array | Int32Array | Uint8Array;
export interface DataArray {
  name: string;
  shape: number[];
  dims: string[];
  unit: string;
  /** Name of the i32 array with the offsets of the rows. */
  ragged?: string;
  values: Values;
}
export type ArrayHead = Pick<ArrayInfo, 'name' | 'dtype' | 'shape' | 'dims' | 'unit' | 'ragged'>;

export interface Body {
  model: string;
  parameters: { [name: string]: Json };
  numerics: { [name: string]: Json };
}

/** What a plot is made of: the question and some or all arrays of its result. */
export interface ResultData {
  body: Body;
  arrays: ReadonlyMap<string, DataArray>;
}

/** Raw little-endian bytes as numbers; copied when they do not lie on a multiple of their size. */
export function toDataArray(head: ArrayHead, bytes: Uint8Array | ArrayBuffer): DataArray {
  const view = bytes instanceof Uint8Array ? bytes : new Uint8Array(bytes);
  const size = { f64: 8, i32: 4, u8: 1 }[head.dtype];
  const aligned = view.byteOffset % size === 0 ? view : view.slice();
  const length = aligned.byteLength / size;
  const Kind = { f64: Float64Array, i32: Int32Array, u8: Uint8Array }[head.dtype];
  const values = new Kind(aligned.buffer as ArrayBuffer, aligned.byteOffset, length);
  const { name, shape, dims, unit, ragged } = head;
  return { name, shape, dims, unit, values, ...(ragged ? { ragged } : {}) };
}

/** An array that must be there; the plot's own list of needs has asked for it. */
export function need(data: ResultData, name: string): DataArray {
  const array = data.arrays.get(name);
  if (!array) throw new Error(`the result has no array ${name}`);
  return array;
}

/** First and one-past-last place of row `row` of a ragged array. */
export function rowBounds(data: ResultData, array: DataArray, row: number): [from: number, to: number] {
  if (!array.ragged) {
    const length = array.shape.at(-1) ?? 1;
    return [row * length, (row + 1) * length];
  }
  const offsets = need(data, array.ragged).values;
  return [offsets[row] as number, offsets[row + 1] as number];
}

/** Is entry `i` of `name` there? Arrays without a companion are complete. */
export const isValid = (data: ResultData, name: string, i: number): boolean =>
  (data.arrays.get(`${name}Valid`)?.values[i] ?? 1) !== 0;

/** Points of an axis as written in a specification; for drawing, so plain host arithmetic will do. */
export function axisValues(value: Json | undefined): number[] {
  if (typeof value === 'number') return [value];
  if (typeof value !== 'object' || value === null || Array.isArray(value)) return [];
  if (Array.isArray(value.values)) return value.values as number[];
  const { start, stop, count } = value as { start: number; stop: number; count: number };
  if (!(count > 0)) return [];
  return Array.from({ length: count }, (_, i) => (count === 1 ? start : start + ((stop - start) * i) / (count - 1)));
}

/** The axis from the result where the kernel returned it, else from the specification. */
export const axisOf = (data: ResultData, name: string): number[] =>
  data.arrays.has(name) ? Array.from(need(data, name).values) : axisValues(data.body.parameters[name]);

/** Kind of a choice. */
export function kindOf(value: Json | undefined): string {
  return typeof value === 'object' && value !== null && !Array.isArray(value) ? String(value.kind) : '';
}

export function member(value: Json | undefined, name: string): Json | undefined {
  return typeof value === 'object' && value !== null && !Array.isArray(value) ? value[name] : undefined;
}

export const numberOf = (value: Json | undefined, fallback = 0): number =>
  typeof value === 'number' ? value : fallback;
