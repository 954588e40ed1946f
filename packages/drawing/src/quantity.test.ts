import { expect, test } from 'vitest';
import { formatNumber, formatQuantity, formatSize, formatWithError } from './quantity.ts';

test('the error decides the digits', () => {
  expect(formatWithError(226.4061, 0.0039)).toBe('226.406(4)');
  expect(formatWithError(1.2345, 0.012)).toBe('1.234(12)');
  expect(formatWithError(12345, 300)).toBe('12300(300)');
  expect(formatWithError(105.6177645383102, 2e-13)).toBe('105.6177645');
  expect(formatWithError(-0.5, 0.02)).toBe('−0.50(2)');
});

test('energies below one eV are read in meV, their errors too', () => {
  expect(formatQuantity(0.036302, 'eV', 4e-6)).toBe('36.302(4) meV');
  expect(formatQuantity(1.5, 'eV')).toBe('1.5 eV');
  expect(formatQuantity(0, 'eV', 3e-6)).toBe('0(3) µeV');
  expect(formatQuantity(0.5751, 'eV nm')).toBe('0.5751 eV nm');
});

test('numbers are neither padded nor rounded away', () => {
  expect(formatNumber(0.1)).toBe('0.1');
  expect(formatNumber(-1234567)).toBe('−1.235e6');
  expect(formatNumber(2.5e-7)).toBe('2.5e−7');
  expect(formatNumber(Number.NaN)).toBe('–');
});

test('sizes of errors have two figures', () => {
  expect(formatSize(3.94e-6, 'eV')).toBe('3.9 µeV');
  expect(formatSize(2.857e-10, 'eV')).toBe('2.9e−10 eV');
  expect(formatSize(0, 'eV')).toBe('0 eV');
});
