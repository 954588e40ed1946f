import { expect, test } from 'vitest';
import { displayUnit } from './axis-unit.ts';

test('energies below one eV are drawn in meV, below one meV in µeV', () => {
  expect(displayUnit('eV', 0.3)).toEqual({ factor: 1000, unit: 'meV' });
  expect(displayUnit('eV', -2e-5)).toEqual({ factor: 1e6, unit: 'µeV' });
  expect(displayUnit('eV', 1)).toEqual({ factor: 1, unit: 'eV' });
});

test('an empty range and an unknown unit stay as they are', () => {
  expect(displayUnit('eV', 0)).toEqual({ factor: 1, unit: 'eV' });
  expect(displayUnit('1/(eV nm²)', 1e-5)).toEqual({ factor: 1, unit: '1/(eV nm²)' });
});
