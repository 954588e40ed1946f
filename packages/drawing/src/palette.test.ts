import { expect, test } from 'vitest';
import { oklchToHex } from './oklch.ts';
import { night, paper } from './palette.ts';
import { rampColors, rampStep } from './ramp.ts';

/** WCAG 2.2 relative luminance of #rrggbb. */
function luminance(hex: string): number {
  const [r, g, b] = [1, 3, 5]
    .map((i) => Number.parseInt(hex.slice(i, i + 2), 16) / 255)
    .map((c) => (c <= 0.04045 ? c / 12.92 : ((c + 0.055) / 1.055) ** 2.4)) as [number, number, number];
  return 0.2126 * r + 0.7152 * g + 0.0722 * b;
}
const contrast = (a: string, b: string) => {
  const [high, low] = [luminance(a), luminance(b)].sort((p, q) => q - p) as [number, number];
  return (high + 0.05) / (low + 0.05);
};

test('white, black and mid grey of OKLCH', () => {
  expect(oklchToHex(1, 0, 0)).toBe('#ffffff');
  expect(oklchToHex(0, 0, 0)).toBe('#000000');
});

test.each([paper, night])('every pen of $name is seen on its ground', (palette) => {
  for (const pen of [palette.K, palette.kPrime, palette.closed, palette.other, palette.rule, palette.amber])
    expect(contrast(pen, palette.ground)).toBeGreaterThan(3);
  expect(contrast(palette.ink, palette.ground)).toBeGreaterThan(12);
  expect(contrast(palette.K, palette.kPrime)).toBeGreaterThan(1.8);
});

test.each(['paper', 'night'] as const)(
  'the density scale of %s climbs away from the ground without a turn',
  (theme) => {
    const lights = rampColors('density', theme).map(luminance);
    expect(lights).toHaveLength(40);
    const sign = theme === 'paper' ? -1 : 1;
    for (let i = 1; i < lights.length; i++)
      expect(sign * ((lights[i] as number) - (lights[i - 1] as number))).toBeGreaterThan(0);
  },
);

test('the signed scale is palest on both sides of zero', () => {
  expect(rampStep(-1e-9, [-1, 1])).toBe(19);
  expect(rampStep(1e-9, [-1, 1])).toBe(20);
  const colors = rampColors('signed', 'paper');
  expect(luminance(colors[19] as string)).toBeGreaterThan(luminance(colors[0] as string));
  expect(luminance(colors[20] as string)).toBeGreaterThan(luminance(colors[39] as string));
});
