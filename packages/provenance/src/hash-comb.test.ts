import { expect, test } from 'vitest';
import { hashComb } from './hash-comb.ts';
import { groupedShortHash } from './short-hash.ts';

test('the comb shows the first 24 bits', () => {
  // 0x053977 = octal 01234567
  expect(hashComb(`053977${'0'.repeat(58)}`)).toEqual({ tints: [95, 88, 79, 69, 58, 47, 36], keel: { kind: 'none' } });
  // 0xfac686 = octal 76543206
  expect(hashComb(`fac686${'f'.repeat(58)}`)).toEqual({ tints: [25, 36, 47, 58, 69, 79, 95], keel: { kind: 'ring' } });
  expect(hashComb('000005').keel).toEqual({ kind: 'cell', cell: 5 });
  expect(hashComb('000000')).toEqual({ tints: [95, 95, 95, 95, 95, 95, 95], keel: { kind: 'cell', cell: 0 } });
});

test('what is no digest is refused', () => {
  expect(() => hashComb('xyz')).toThrow(/hexadecimal/);
});

test('the short form', () => {
  expect(groupedShortHash('7f3a9c2104be5555')).toBe('7f3a·9c21·04be');
});
