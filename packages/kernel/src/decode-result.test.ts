import type { ModelManifest } from '@nightcone/models';
import { describe, expect, it } from 'vitest';
import { decodeResult } from './decode-result.ts';
import { KernelCrash } from './types.ts';

const model = {
  results: [
    { name: 'offsets', dtype: 'i32', dims: ['row'], unit: '' },
    { name: 'energies', dtype: 'f64', dims: ['row'], unit: 'eV', ragged: 'offsets' },
  ],
  certificate: [{ name: 'largest', unit: 'eV' }],
  checks: [
    { code: 'first', unit: '' },
    { code: 'second', unit: '' },
  ],
} as unknown as ModelManifest;

/** A result of one array `energies` = [1, 2, 3] and the given certificate. */
function buffer(certificate: number[], { magic = 0x3153434e, index = 1, dtype = 0, rank = 1 } = {}): Uint8Array {
  const bytes = new Uint8Array(16 + 40 + 24 + 8 * certificate.length);
  const view = new DataView(bytes.buffer);
  for (const [i, word] of [magic, 1, 1, certificate.length, index, dtype, rank, 0, 3].entries())
    view.setUint32(4 * i, word, true);
  view.setFloat64(40, 56, true);
  view.setFloat64(48, 24, true);
  for (const [i, value] of [1, 2, 3, ...certificate].entries()) view.setFloat64(56 + 8 * i, value, true);
  return bytes;
}

describe('decodeResult', () => {
  it('names arrays and certificate by the manifest and copies the bytes as they are', () => {
    const source = buffer([0.5, 1, 10, 11, 2, 1]);
    const { arrays, certificate } = decodeResult(model, source);
    expect(arrays).toEqual([
      {
        name: 'energies',
        dtype: 'f64',
        shape: [3],
        dims: ['row'],
        unit: 'eV',
        ragged: 'offsets',
        bytes: source.slice(56, 80),
      },
    ]);
    source.fill(0);
    expect([...new Float64Array(arrays[0]?.bytes.slice().buffer as ArrayBuffer)]).toEqual([1, 2, 3]);
    expect(certificate).toEqual({
      numbers: { largest: 0.5 },
      checks: [{ code: 'second', computed: 10, expected: 11, tolerance: 2, holds: true }],
    });
  });

  it.each([
    ['another magic number', buffer([0], { magic: 1 })],
    ['an array the manifest does not have', buffer([0], { index: 2 })],
    ['an array of another type', buffer([0], { dtype: 1 })],
    ['an array of another rank', buffer([0], { rank: 2 })],
    ['a negative zero in the certificate', buffer([-0])],
    ['a NaN in the certificate', buffer([Number.NaN])],
    ['a check the manifest does not have', buffer([0, 7, 0, 0, 0, 0])],
  ])('calls it a crash: %s', (_, bytes) => {
    expect(() => decodeResult(model, bytes)).toThrow(KernelCrash);
  });
});
