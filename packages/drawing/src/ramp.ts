import { oklchToHex } from './oklch.ts';

export const rampSteps = 40;

/** Corner points of a ramp in OKLCH; between them lightness, chroma and hue are linear, lightness over the whole. */
type Corner = [at: number, chroma: number, hue: number];
const densityOnPaper: Corner[] = [
  [0, 0.014, 100],
  [0.2, 0.055, 145],
  [0.5, 0.098, 185],
  [0.78, 0.088, 235],
  [1, 0.045, 272],
];
const densityOnNight: Corner[] = [
  [0, 0.03, 275],
  [0.22, 0.075, 250],
  [0.5, 0.098, 195],
  [0.8, 0.1, 155],
  [1, 0.05, 108],
];
const positive: Corner[] = [
  [0, 0.01, 150],
  [0.45, 0.105, 150],
  [1, 0.07, 155],
];
const negative: Corner[] = [
  [0, 0.01, 308],
  [0.45, 0.12, 308],
  [1, 0.1, 305],
];

function color(corners: Corner[], fraction: number, from: number, to: number): string {
  const next = Math.max(
    1,
    corners.findIndex(([at]) => at >= fraction),
  );
  const [a, chromaA, hueA] = corners[next - 1] as Corner;
  const [b, chromaB, hueB] = corners[next] as Corner;
  const part = (fraction - a) / (b - a);
  return oklchToHex(from + (to - from) * fraction, chromaA + (chromaB - chromaA) * part, hueA + (hueB - hueA) * part);
}

const steps = (make: (fraction: number) => string, count: number) =>
  Array.from({ length: count }, (_, i) => make(i / (count - 1)));

/** Equal steps of lightness, so that equal ratios of a density look equal; low values lie at the ground of the theme. */
const densityPaper = steps((f) => color(densityOnPaper, f, 0.965, 0.24), rampSteps);
const densityNight = steps((f) => color(densityOnNight, f, 0.22, 0.95), rampSteps);
/** 0 in the middle (between the two middle steps), equal lightness at equal distance on both sides. */
const half = rampSteps / 2;
const signed = (from: number, to: number) => [
  ...steps((f) => color(negative, f, from, to), half).reverse(),
  ...steps((f) => color(positive, f, from, to), half),
];
const signedPaper = signed(0.965, 0.36);
const signedNight = signed(0.22, 0.85);

/** The 40 colours of a scale, from low to high. */
export function rampColors(scale: 'density' | 'signed', theme: 'paper' | 'night'): readonly string[] {
  if (scale === 'density') return theme === 'paper' ? densityPaper : densityNight;
  return theme === 'paper' ? signedPaper : signedNight;
}

/** Step 0…39 of a value; outside the domain the end steps. */
export function rampStep(value: number, [low, high]: readonly [number, number]): number {
  const fraction = high > low ? (value - low) / (high - low) : 0;
  return Math.min(rampSteps - 1, Math.max(0, Math.floor(fraction * rampSteps)));
}
