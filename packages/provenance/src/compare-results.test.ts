import type { KernelResult, ResultArrayData } from '@nightcone/kernel';
import fc from 'fast-check';
import { expect, test } from 'vitest';
import { compareResults, ulpDistance } from './compare-results.ts';

const array = (name: string, values: number[], more: Partial<ResultArrayData> = {}): ResultArrayData => ({
  name,
  dtype: 'f64',
  shape: [values.length],
  dims: ['level'],
  unit: 'eV',
  bytes: new Uint8Array(new Float64Array(values).buffer),
  ...more,
});
const result = (...arrays: ResultArrayData[]): KernelResult => ({
  arrays,
  certificate: { numbers: { residual: 1 }, checks: [] },
});

test('the same bits are identical', () => {
  expect(compareResults(result(array('e', [1, 2])), result(array('e', [1, 2])))).toEqual({
    identical: true,
    certificate: 'identical',
    arrays: [{ name: 'e', verdict: 'identical' }],
  });
});

test('different bits are measured and placed', () => {
  const shape = { shape: [2, 2], dims: ['k', 'level'] };
  const [first, second] = [array('e', [1, 2, 1e-20, 4], shape), array('e', [1, 2.5, 3e-20, 4.000000000000001], shape)];
  const comparison = compareResults(result(first), result(second));
  expect(comparison.identical).toBe(false);
  expect(comparison.arrays[0]).toMatchObject({
    verdict: 'different',
    count: 3,
    of: 4,
    absolute: { value: 0.5, index: [0, 1] },
    relative: { index: [1, 0] },
    ulps: { index: [1, 0] },
  });
});

test('0 and -0 are different bits, no distance apart', () => {
  const comparison = compareResults(result(array('e', [0])), result(array('e', [-0])));
  expect(comparison.arrays[0]).toMatchObject({
    verdict: 'different',
    count: 1,
    absolute: { value: 0 },
    ulps: { value: 0 },
  });
});

test('another shape, type or unit is told, not compared; what is missing is named', () => {
  const whole = array('n', [1], { dtype: 'i32', bytes: new Uint8Array(4) });
  const { arrays } = compareResults(
    result(array('e', [1, 2]), array('a', [1]), array('n', [1])),
    result(array('e', [1]), whole, array('b', [1])),
  );
  expect(arrays).toEqual([
    { name: 'e', verdict: 'incomparable', first: 'f64 [2] along level eV', second: 'f64 [1] along level eV' },
    { name: 'a', verdict: 'missing', from: 'second' },
    { name: 'n', verdict: 'incomparable', first: 'f64 [1] along level eV', second: 'i32 [1] along level eV' },
    { name: 'b', verdict: 'missing', from: 'first' },
  ]);
});

test('the certificate counts', () => {
  const other = { ...result(array('e', [1])), certificate: { numbers: { residual: 2 }, checks: [] } };
  expect(compareResults(result(array('e', [1])), other)).toMatchObject({ identical: false, certificate: 'different' });
});

test('steps between doubles: next to each other, across zero, symmetric', () => {
  expect(ulpDistance(1, 1 + Number.EPSILON)).toBe(1);
  expect(ulpDistance(-Number.MIN_VALUE, Number.MIN_VALUE)).toBe(2);
  const doubles = fc.double({ noNaN: true });
  fc.assert(
    fc.property(
      doubles,
      doubles,
      (a, b) => ulpDistance(a, b) === ulpDistance(b, a) && (a === b) === (ulpDistance(a, b) === 0),
    ),
  );
});
