import { expect, test } from 'vitest';
import { symbolRuns, symbolText } from './symbol.ts';

test('letters are italic, numbers and operators upright, indices lowered', () => {
  expect(symbolRuns('E_{\\min}')).toEqual([
    { text: 'E', italic: true },
    { text: 'min', italic: false, shift: 'sub' },
  ]);
  expect(symbolRuns('\\gamma_1')).toEqual([
    { text: 'γ', italic: true },
    { text: '1', italic: false, shift: 'sub' },
  ]);
  expect(symbolText('\\hbar v')).toBe('ħv');
  expect(symbolText('v_3/v')).toBe('v3/v');
  expect(symbolText('\\mathcal{A}')).toBe('A');
  expect(symbolText('\\tau m')).toBe('τm');
});

test('an unknown command vanishes instead of showing its backslash', () => {
  expect(symbolText('\\unknown x')).toBe('x');
});
