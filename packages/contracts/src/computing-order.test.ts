import fc from 'fast-check';
import { expect, test } from 'vitest';
import { computingOrder } from './computing-order.ts';

test('a line: ends, middle, quarters', () => {
  expect(computingOrder([9])).toEqual([0, 8, 4, 2, 6, 1, 3, 5, 7]);
});

test('a map begins with its corners, then edges and centre', () => {
  expect(computingOrder([3, 5]).slice(0, 4)).toEqual([0, 4, 10, 14]);
  expect(new Set(computingOrder([3, 5]).slice(4, 9))).toEqual(new Set([2, 5, 7, 9, 12]));
});

test('every place comes exactly once', () => {
  fc.assert(
    fc.property(fc.array(fc.integer({ min: 1, max: 12 }), { maxLength: 3 }), (shape) => {
      const places = shape.reduce((product, length) => product * length, 1);
      expect([...computingOrder(shape)].sort((a, b) => a - b)).toEqual(Array.from({ length: places }, (_, i) => i));
    }),
  );
});
