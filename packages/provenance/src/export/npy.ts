import type { ResultArrayData } from '@nightcone/kernel';

/** NumPy's file format of one array, version 1.0 (NEP 1): magic, header length, a Python dict, then the raw bytes. */
const descriptions = { f64: '<f8', i32: '<i4', u8: '|u1' } as const;
const magic = [0x93, 0x4e, 0x55, 0x4d, 0x50, 0x59, 1, 0]; // \x93NUMPY, version 1.0

/** The header alone; the bytes of the array follow it unchanged. Its length is a multiple of 64. */
export function npyHeader({ dtype, shape }: Pick<ResultArrayData, 'dtype' | 'shape'>): Uint8Array {
  const tuple = `(${shape.join(', ')}${shape.length === 1 ? ',' : ''})`;
  const dict = `{'descr': '${descriptions[dtype]}', 'fortran_order': False, 'shape': ${tuple}, }`;
  const padding = 63 - ((magic.length + 2 + dict.length) % 64);
  const text = `${dict}${' '.repeat(padding)}\n`;
  const header = new Uint8Array(magic.length + 2 + text.length);
  header.set(magic);
  new DataView(header.buffer).setUint16(magic.length, text.length, true);
  header.set(new TextEncoder().encode(text), magic.length + 2);
  return header;
}

/** A whole `.npy` file. */
export function npyBytes(array: ResultArrayData): Uint8Array {
  const header = npyHeader(array);
  const file = new Uint8Array(header.length + array.bytes.length);
  file.set(header);
  file.set(array.bytes, header.length);
  return file;
}

/** Type, shape and raw bytes of a `.npy` file that was written here. Throws on anything else. */
export function readNpy(file: Uint8Array): Pick<ResultArrayData, 'dtype' | 'shape' | 'bytes'> {
  if (magic.some((byte, i) => file[i] !== byte)) throw new SyntaxError('no NumPy array of version 1.0');
  const start = magic.length + 2;
  const length = new DataView(file.buffer, file.byteOffset).getUint16(magic.length, true);
  const text = new TextDecoder().decode(file.subarray(start, start + length));
  const [, descr, tuple = ''] =
    /^\{'descr': '([^']+)', 'fortran_order': False, 'shape': \(([\d, ]*)\)/.exec(text) ?? [];
  const dtype = (Object.keys(descriptions) as (keyof typeof descriptions)[]).find((key) => descriptions[key] === descr);
  if (dtype === undefined) throw new SyntaxError(`a NumPy array of another kind: ${text.trim()}`);
  const shape = tuple
    .split(',')
    .filter((part) => part.trim() !== '')
    .map(Number);
  return { dtype, shape, bytes: file.slice(start + length) };
}
