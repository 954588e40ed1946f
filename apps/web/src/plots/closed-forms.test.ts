import { expect, test } from 'vitest';
import { landauLevel, magneticLengthNm, ribbonWidthNm, transverseWaveNumbers } from './closed-forms.ts';

const armchair = (count: number) => ({
  edge: { kind: 'armchair' },
  width: { kind: 'dimer-lines', count },
  bondLengthNm: 0.142,
  diracVelocityEvNm: 0.5751,
});

test('the first Landau level of one cone at 10 T is 100.248 meV for ħv = 0.5751 eV nm', () => {
  // E₁ = ħv √2 / l with l = 25.656 nm / √(B/T) (McClure, Phys. Rev. 104, 666 (1956)); the length is common practice
  expect(magneticLengthNm(1)).toBeCloseTo(25.6556, 3);
  expect(landauLevel(1, 10, 0.5751)).toBeCloseTo(0.10024794571, 9);
  expect(landauLevel(-2, 10, 0.5751)).toBeCloseTo(-0.141772004, 8);
});

test('levels of empty armchair ribbons at k = 0.05', () => {
  // q = nπ/W − 4π/3a, W = (N + 1)a/2 (Brey & Fertig, PRB 73, 235411 (2006)); N = 40 and the metallic N = 41
  const lowest = (count: number) =>
    transverseWaveNumbers(armchair(count), 0.9)
      .map((q) => 0.5751 * Math.hypot(0.05, q))
      .sort((a, b) => a - b)
      .slice(0, 3);
  [0.12285778546, 0.24061502803, 0.47864581559].forEach((energy, i) => {
    expect(lowest(40)[i]).toBeCloseTo(energy, 9);
  });
  [0.028755, 0.35098404885, 0.35098404885].forEach((energy, i) => {
    expect(lowest(41)[i]).toBeCloseTo(energy, 9);
  });
});

test('the three ways to state a width', () => {
  expect(ribbonWidthNm(armchair(40))).toBeCloseTo(5.04199990083, 10);
  expect(ribbonWidthNm({ width: { kind: 'nm', widthNm: 7 } })).toBe(7);
  const chains = { kind: 'zigzag-chains', count: 10 };
  expect(ribbonWidthNm({ bondLengthNm: 0.142, width: { ...chains, rule: 'geometric' } })).toBeCloseTo(16 * 0.142, 12);
  expect(ribbonWidthNm({ bondLengthNm: 0.142, width: { ...chains, rule: 'matching' } })).toBeCloseTo(15.75 * 0.142, 12);
});
