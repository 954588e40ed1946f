import type { ResultArrayData } from '@nightcone/kernel';
import fc from 'fast-check';
import { zipSync } from 'fflate';
import { describe, expect, test } from 'vitest';
import { resultDigest } from '../result-digest.ts';
import { sha256Hex } from '../sha256.ts';
import { csvChunks } from './csv.ts';
import { jsonChunks, jsonText } from './json.ts';
import { npyBytes, readNpy } from './npy.ts';
import { npzChunks, readNpz, recordMember } from './npz.ts';
import { numberText } from './number-text.ts';
import { readResultJson } from './read-json.ts';
import type { ResultRecord } from './result-record.ts';

const bytes = (view: ArrayBufferView) => new Uint8Array(view.buffer);
const arrays: ResultArrayData[] = [
  { name: 'fieldT', dtype: 'f64', shape: [2], dims: ['field'], unit: 'T', bytes: bytes(new Float64Array([0.1, 2])) },
  {
    name: 'energies',
    dtype: 'f64',
    shape: [2, 2],
    dims: ['field', 'level'],
    unit: 'eV',
    bytes: bytes(new Float64Array([-0, 1 / 3, 1e-300, -1.5e22])),
  },
  {
    name: 'energiesValid',
    dtype: 'u8',
    shape: [2, 2],
    dims: ['field', 'level'],
    unit: '',
    bytes: new Uint8Array([0, 1, 1, 1]),
  },
  {
    name: 'roots',
    dtype: 'f64',
    shape: [3],
    dims: ['field', 'root'],
    unit: '1/nm',
    ragged: 'rootOffsets',
    bytes: bytes(new Float64Array([1, 2, 3])),
  },
  {
    name: 'rootOffsets',
    dtype: 'i32',
    shape: [3],
    dims: ['row'],
    unit: '',
    bytes: bytes(new Int32Array([0, 1, 3])),
  },
  { name: 'gapEv', dtype: 'f64', shape: [], dims: [], unit: 'eV', bytes: bytes(new Float64Array([0.25])) },
];
const record: ResultRecord = {
  specification: {
    schema: 'nightcone.job/1',
    model: 'landau-levels',
    parameters: { levels: 1 },
    numerics: {},
    tables: [],
    kernel: 'a'.repeat(64),
  },
  jobHash: 'b'.repeat(64),
  resultDigest: 'c'.repeat(64),
  result: { arrays, certificate: { numbers: { residual: 1e-13 }, checks: [] } },
  notes: [],
};

function join(chunks: Iterable<Uint8Array>): Uint8Array {
  const parts = [...chunks];
  const whole = new Uint8Array(parts.reduce((sum, part) => sum + part.length, 0));
  let at = 0;
  for (const part of parts) {
    whole.set(part, at);
    at += part.length;
  }
  return whole;
}

test('numbers read back as the same double', () => {
  fc.assert(
    fc.property(fc.double({ noNaN: true, noDefaultInfinity: true }), (value) =>
      Object.is(JSON.parse(numberText(value)), value),
    ),
  );
  expect([0.1, 1 / 3, 0.5, -0, 1e21, 12345678].map(numberText)).toEqual([
    '0.10000000000000001',
    '0.33333333333333331',
    '0.5',
    '-0',
    '1e+21',
    '12345678',
  ]);
});

describe('JSON', () => {
  test('has the stable shape', () => {
    const parsed = JSON.parse(jsonText(record));
    expect(Object.keys(parsed)).toEqual([
      'jobHash',
      'resultDigest',
      'kernel',
      'specification',
      'arrays',
      'certificate',
      'notes',
    ]);
    expect(parsed.kernel).toBe('a'.repeat(64));
    expect(parsed.arrays[3]).toEqual({
      name: 'roots',
      dtype: 'f64',
      shape: [3],
      dims: ['field', 'root'],
      unit: '1/nm',
      values: [1, 2, 3],
      ragged: 'rootOffsets',
      offsets: [0, 1, 3],
    });
    expect(parsed.arrays[5].values).toEqual([0.25]);
  });

  test('reads back to the same bytes', async () => {
    const back = readResultJson(jsonText(record));
    expect(back).toEqual(record);
    expect(await resultDigest(back.result)).toBe(await resultDigest(record.result));
  });

  test('comes in pieces', () => {
    const long = { ...arrays[0], shape: [20000], bytes: new Uint8Array(160000) } as ResultArrayData;
    const pieces = [...jsonChunks({ ...record, result: { ...record.result, arrays: [long] } })];
    expect(pieces.length).toBeGreaterThan(4);
    expect(JSON.parse(pieces.join('')).arrays[0].values.length).toBe(20000);
  });

  test('that is not ours is refused', () => {
    expect(() => readResultJson('{}')).toThrow(/lacks/);
    const short = jsonText(record).replace('"shape":[3]', '"shape":[4]');
    expect(() => readResultJson(short)).toThrow(/roots does not hold/);
  });
});

describe('NumPy', () => {
  test('one array: header of 64 bytes times n, then the raw bytes', () => {
    for (const array of arrays) {
      const file = npyBytes(array);
      expect((file.length - array.bytes.length) % 64).toBe(0);
      const { dtype, shape, bytes } = array;
      expect(readNpy(file)).toEqual({ dtype, shape, bytes });
    }
    // as NumPy 1.24 writes it for a float64 array of shape (2,)
    expect(new TextDecoder().decode(npyBytes(arrays[0] as ResultArrayData).subarray(10, 128))).toBe(
      `${"{'descr': '<f8', 'fortran_order': False, 'shape': (2,), }".padEnd(117)}\n`,
    );
    expect(() => readNpy(new Uint8Array(20))).toThrow(/no NumPy array/);
  });

  test('an archive reads back to the same record and is the same bytes every time', async () => {
    const first = join(npzChunks(record));
    expect(readNpz(first)).toEqual(record);
    expect(await sha256Hex(join(npzChunks(record)))).toBe(await sha256Hex(first));
    expect(await sha256Hex(first)).toBe('231563c2a41720bed0bb91f617e4f5614eabe00b39ab14f050b8318c25cc8f49');
  });

  test('what is no archive of ours is refused', () => {
    expect(() => readNpz(new Uint8Array(100))).toThrow(/no readable archive/);
    const packed = zipSync({ [recordMember]: new TextEncoder().encode(JSON.stringify({ arrays: [] }).padEnd(1000)) });
    expect(() => readNpz(packed)).toThrow(/has no nightcone.json/);
  });
});

test('the order in which the parts of a record keep their names changes no byte', () => {
  const turned = turnNames(record);
  expect(Object.keys(turned.specification)).not.toEqual(Object.keys(record.specification));
  expect(jsonText(turned)).toBe(jsonText(record));
  expect(join(npzChunks(turned))).toEqual(join(npzChunks(record)));
});

/** The same objects with their names in the opposite order, as a database may give them back. */
function turnNames<T>(value: T): T {
  if (Array.isArray(value)) return value.map(turnNames) as T;
  if (typeof value !== 'object' || value === null || ArrayBuffer.isView(value)) return value;
  return Object.fromEntries(
    Object.entries(value)
      .reverse()
      .map(([name, inner]) => [name, turnNames(inner)]),
  ) as T;
}

test('CSV: a block for all arrays along the same dimensions, with coordinates and rows of ragged lists', () => {
  const [head, ...blocks] = [...csvChunks(record)].join('').split('\n\n');
  expect(head).toMatch(/^# model landau-levels\n# job b{64}\n/);
  expect(blocks.map((block) => block.trim().split('\n'))).toEqual([
    ['fieldT (T)', '0.10000000000000001', '2'],
    [
      'fieldT (T),level,energies (eV),energiesValid',
      '0.10000000000000001,0,-0,0',
      '0.10000000000000001,1,0.33333333333333331,1',
      '2,0,1e-300,1',
      '2,1,-1.5e+22,1',
    ],
    ['fieldT (T),root,roots (1/nm)', '0.10000000000000001,0,1', '2,0,2', '2,1,3'],
    ['row,rootOffsets', '0,0', '1,1', '2,3'],
    ['gapEv (eV)', '0.25'],
  ]);
});
