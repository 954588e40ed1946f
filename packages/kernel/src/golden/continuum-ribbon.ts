import type { Json } from '@nightcone/models';
import type { GoldenJob } from './golden-job.ts';

const range = (start: number, stop: number, count: number): Json => ({ kind: 'range', start, stop, count });
const polynomial = (...coefficients: number[]): Json => ({ kind: 'polynomial', coefficients });
const nm = (widthNm: number): Json => ({ kind: 'nm', widthNm });
const nearest = (energyEv: number, count: number): Json => ({ kind: 'nearest', energyEv, count });
const window = (eMin: number, eMax: number): Json => ({ kind: 'window', eMin, eMax });
const walls = (lowerSign: number, upperSign: number): Json => ({ kind: 'infinite-mass', lowerSign, upperSign });

const golden = (
  name: string,
  parameters: { [name: string]: Json },
  numerics: { [name: string]: Json } = {},
  tables?: GoldenJob['tables'],
): GoldenJob => ({
  name,
  model: 'continuum-ribbon',
  parameters: { kPerNm: range(-0.3, 0.3, 31), energyEv: range(-0.2, 0.2, 21), spectrum: nearest(0, 6), ...parameters },
  numerics: { grid: { kind: 'extrapolated', cells: 60 }, states: [], ...numerics },
  ...(tables ? { tables } : {}),
});

const table = 'a7'.repeat(32);
const rows = [-12, -7, -2, 1, 5, 12];

export const continuumRibbonGolden: GoldenJob[] = [
  golden('ribbon-armchair-gapped', { width: { kind: 'dimer-lines', count: 40 } }),
  golden('ribbon-armchair-metallic', { width: { kind: 'dimer-lines', count: 41 }, temperatureK: 30 }),
  golden(
    'ribbon-armchair-fields',
    {
      width: nm(18.3),
      fieldT: 15,
      potentialEv: polynomial(0.01, 0.002, 0.0002),
      massEv: polynomial(0.03, -0.001),
      valleyMassEv: polynomial(0.004, 0.0003),
      gaugePerNm: polynomial(-0.005, 0.004),
    },
    { states: [0, 15, 30] },
  ),
  golden(
    'ribbon-zigzag-field',
    { edge: { kind: 'zigzag' }, width: nm(40), fieldT: 12, spectrum: window(-0.21, 0.21) },
    { states: [10, 22] },
  ),
  golden('ribbon-zigzag-chains', {
    edge: { kind: 'zigzag' },
    width: { kind: 'zigzag-chains', count: 60, rule: 'geometric' },
    valleys: 'K-prime',
  }),
  golden('ribbon-infinite-mass-steps', {
    edge: walls(1, 1),
    valleys: 'K',
    width: nm(22),
    potentialEv: { kind: 'steps', edges: [-3.3, 4.1], values: [0.05, -0.02, 0.03] },
    massEv: { kind: 'sine', amplitude: 0.03, periodNm: 11, phase: 0.4 },
  }),
  golden('ribbon-mass-domain', { edge: walls(-1, 1), width: nm(20), fieldT: 4, spectrum: window(-0.2, 0.2) }),
  golden(
    'ribbon-walls-negative',
    { edge: walls(-1, -1), width: nm(20), fieldT: 6 },
    { grid: { kind: 'single', cells: 80 } },
  ),
  golden('ribbon-periodic', {
    edge: { kind: 'periodic', blochPhaseRad: 0.7 },
    width: nm(25),
    fieldProfileT: { kind: 'sine', amplitude: 20, periodNm: 25, phase: 0 },
    potentialEv: { kind: 'sine', amplitude: 0.04, periodNm: 12.5, phase: 0.3 },
  }),
  golden('ribbon-zeeman', {
    edge: { kind: 'zigzag' },
    width: nm(30),
    fieldT: 14,
    spin: { kind: 'zeeman', gFactor: 2.2, tiltDeg: 40 },
    spectrum: nearest(0.05, 5),
  }),
  golden(
    'ribbon-table',
    { edge: { kind: 'zigzag' }, valleys: 'K', width: nm(20), potentialEv: { kind: 'table', table } },
    {},
    {
      [table]: [
        { role: 'x', unit: 'nm', values: rows },
        { role: 'value', unit: 'eV', values: rows.map((x) => x / 250 - (x * x) / 4000) },
      ],
    },
  ),
  golden('ribbon-one-point', { width: { kind: 'dimer-lines', count: 62 }, kPerNm: 0.05, spectrum: window(-0.5, 0.5) }),
];
