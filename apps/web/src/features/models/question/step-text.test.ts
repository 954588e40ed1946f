import { expect, test } from 'vitest';
import { stepText, suggestRange } from './step-text.ts';

test('arrow keys step the last digit typed, exactly', () => {
  expect(stepText('0.1', 1, false, false)).toBe('0.2');
  expect(stepText('0.9', 1, false, false)).toBe('1.0');
  expect(stepText('1.0', 1, false, false)).toBe('1.1');
  expect(stepText('0.5 meV', -1, false, false)).toBe('0.4 meV');
  expect(stepText('12', 1, true, true)).toBe('22');
  expect(stepText('1e-3', 1, false, false)).toBe('0.002');
});

test('a range or a list is not stepped', () => {
  expect(stepText('0..20 / 401', 1, false, false)).toBeNull();
  expect(stepText('1, 2', 1, false, false)).toBeNull();
});

test('a first range lies around the value and inside the limits', () => {
  expect(suggestRange('12', { type: 'number', min: -1000, max: 1000 })).toBe('6..18 / 11');
  expect(suggestRange('40', { type: 'integer', min: 2, max: 20000 })).toBe('40..60 / 21');
  expect(suggestRange('2', { type: 'integer', min: 1, max: 2 })).toBe('2..2 / 2');
  expect(suggestRange('0', { type: 'number', min: 0, max: 5 })).toBe('0..5 / 11');
});
