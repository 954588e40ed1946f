import type { ResultArrayData } from '@nightcone/kernel';

export type ArrayValues = Float64Array | Int32Array | Uint8Array;

export const bytesPerValue = { f64: 8, i32: 4, u8: 1 } as const;

// Results are little-endian; every host that runs WebAssembly engines today is, and a view costs nothing.
if (new Uint8Array(new Uint16Array([1]).buffer)[0] !== 1) throw new Error('this host is not little-endian');

/** The numbers of an array as a view of its bytes (a copy where the bytes are not aligned). */
export function arrayValues({ dtype, bytes }: Pick<ResultArrayData, 'dtype' | 'bytes'>): ArrayValues {
  if (dtype === 'u8') return bytes;
  const aligned = bytes.byteOffset % bytesPerValue[dtype] === 0 ? bytes : bytes.slice();
  const count = aligned.byteLength / bytesPerValue[dtype];
  return dtype === 'f64'
    ? new Float64Array(aligned.buffer, aligned.byteOffset, count)
    : new Int32Array(aligned.buffer, aligned.byteOffset, count);
}

/** Index along every dimension of the value at `flat` (row-major). */
export function indexOf(flat: number, shape: readonly number[]): number[] {
  const index: number[] = [];
  let rest = flat;
  for (const length of [...shape].reverse()) {
    const place = length > 0 ? rest % length : 0;
    index.unshift(place);
    rest = length > 0 ? (rest - place) / length : 0;
  }
  return index;
}
