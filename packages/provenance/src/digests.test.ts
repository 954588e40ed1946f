import type { Field, KernelManifest, KernelResult, Specification } from '@nightcone/kernel';
import { describe, expect, test } from 'vitest';
import { resultDigest, tableDigest } from './result-digest.ts';
import { sha256Hex } from './sha256.ts';
import { canonicalText, jobHash, questionDigest, questionText } from './specification-hash.ts';

// Fixed vectors: computed once by an independent program (Python's json, struct and hashlib); they must never change.

const specification: Specification = {
  schema: 'nightcone.job/1',
  model: 'continuum-ribbon',
  parameters: { valleys: 'K-prime', fieldT: 10, kPerNm: { kind: 'range', start: -0.6, stop: 0.6, count: 241 } },
  numerics: { grid: { kind: 'single', cells: 400 } },
  tables: [],
  kernel: '0'.repeat(64),
};

// Source: FIPS 180-4 example, the message "abc".
test('SHA-256 of abc', async () => {
  expect(await sha256Hex('abc')).toBe('ba7816bf8f01cfea414140de5dae2223b00361a396177a9cb410ff61f20015ad');
});

test('the job hash', async () => {
  expect(await jobHash(specification)).toBe('1dbeff1f7f20922b8527c2a706c751b622ae5b415f2174338c637e7776a2e734');
  expect(canonicalText(specification)).toBe(
    `{"kernel":"${'0'.repeat(64)}","model":"continuum-ribbon","numerics":{"grid":{"cells":400,"kind":"single"}},"parameters":{"fieldT":10,"kPerNm":{"count":241,"kind":"range","start":-0.6,"stop":0.6},"valleys":"K-prime"},"schema":"nightcone.job/1","tables":[]}`,
  );
  // the order of names, members of our own beside it, and -0 change nothing
  const again = { note: 'mine', ...Object.fromEntries(Object.entries(specification).reverse()) };
  expect(await jobHash(again as unknown as Specification)).toBe(await jobHash(specification));
});

function sampleResult(): KernelResult {
  const bytes = (view: ArrayBufferView) => new Uint8Array(view.buffer);
  return {
    arrays: [
      {
        name: 'energies',
        dtype: 'f64',
        shape: [3],
        dims: ['level'],
        unit: 'eV',
        ragged: 'offsets',
        bytes: bytes(new Float64Array([0.1, -2.5, 0])),
      },
      { name: 'offsets', dtype: 'i32', shape: [2], dims: ['k'], unit: '', bytes: bytes(new Int32Array([0, 3])) },
    ],
    certificate: {
      numbers: { residual: 1e-13 },
      checks: [{ code: 'ladder', computed: 1, expected: 1, tolerance: 1e-9, holds: true }],
    },
  };
}

describe('the result digest', () => {
  const fixed = '69980a68181378b04dda8f065d875dec18a6bce86bc380507c5cb969629f837e';

  test('is fixed', async () => {
    expect(await resultDigest(sampleResult())).toBe(fixed);
  });

  test('changes with one bit of an array, with a name, a unit and the certificate', async () => {
    const bit = sampleResult();
    (bit.arrays[0] as { bytes: Uint8Array }).bytes[0] = 0x9b;
    const unit = sampleResult();
    (unit.arrays[0] as { unit: string }).unit = 'meV';
    const certificate = sampleResult();
    certificate.certificate.numbers.residual = 2e-13;
    const digests = await Promise.all([bit, unit, certificate].map(resultDigest));
    expect(new Set([fixed, ...digests]).size).toBe(4);
  });
});

test('the table digest', async () => {
  const columns = [
    { role: 'x', unit: 'nm', values: new Float64Array([-1, 1]) },
    { role: 'value', unit: 'eV', values: new Float64Array([0.25, -0]) },
  ];
  expect(await tableDigest({ columns })).toBe('d7a32362a1de52bf29cf6573edad523241434bda3c31dfef4e2f83202f4d9447');
});

describe('the question digest', () => {
  const number = { type: 'number', unit: '', min: -9, max: 9 } as const;
  const parameters: Field[] = [
    { name: 'a', ...number, default: 1 },
    {
      name: 'edge',
      type: 'choice',
      default: { kind: 'x' },
      kinds: [
        { kind: 'x', members: [{ name: 'm', ...number, default: 2 }] },
        { kind: 'y', members: [] },
      ],
    },
    { name: 'span', type: 'group', members: [{ name: 'from', ...number, default: 3 }] },
  ];
  const manifest = {
    interface: 1,
    version: '0',
    models: [{ id: 'model', parameters, numerics: [] }],
  } as unknown as KernelManifest;
  const asked = (parameters: Specification['parameters'], kernel = '0'.repeat(64)): Specification => ({
    ...specification,
    model: 'model',
    parameters,
    numerics: {},
    kernel,
  });

  test('leaves out the kernel and what equals its default, nested too', () => {
    const empty = '{"model":"model","numerics":{},"parameters":{},"schema":"nightcone.question/1","tables":[]}';
    expect(questionText(manifest, asked({ a: 1, edge: { kind: 'x', m: 2 }, span: { from: 3 } }))).toBe(empty);
    expect(
      JSON.parse(questionText(manifest, asked({ a: 2, edge: { kind: 'x', m: 5 }, span: { from: 4 } }))).parameters,
    ).toEqual({
      a: 2,
      edge: { kind: 'x', m: 5 },
      span: { from: 4 },
    });
    expect(
      JSON.parse(questionText(manifest, asked({ a: 1, edge: { kind: 'y' }, span: { from: 3 } }))).parameters,
    ).toEqual({
      edge: { kind: 'y' },
    });
  });

  test('is the same under every kernel', async () => {
    const parameters = { a: 4, edge: { kind: 'y' }, span: { from: 3 } };
    expect(await questionDigest(manifest, asked(parameters))).toBe(
      await questionDigest(manifest, asked(parameters, 'f'.repeat(64))),
    );
  });
});
