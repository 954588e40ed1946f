import type { Json } from '@nightcone/models';
import type { GoldenJob } from './golden-job.ts';

const range = (start: number, stop: number, count: number): Json => ({ kind: 'range', start, stop, count });
const small: { [name: string]: Json } = {
  fieldT: range(0, 12, 19),
  levels: 4,
  energyEv: range(-0.3, 0.3, 31),
  carrierPerNm2: range(-0.02, 0.02, 11),
};
const monolayer = (massEv: number, electricFieldEvPerNm: number, kPerNm: number): Json => ({
  kind: 'monolayer',
  massEv,
  electricFieldEvPerNm,
  kPerNm,
});
const bilayer = (v3Ratio: number, v4Ratio: number, biasEv: number, dimerOffsetEv: number): Json => ({
  kind: 'bilayer',
  gamma1Ev: 0.39,
  v3Ratio,
  v4Ratio,
  biasEv,
  dimerOffsetEv,
});
const golden = (name: string, parameters: { [name: string]: Json }, method: Json = { kind: 'auto' }): GoldenJob => ({
  name,
  model: 'landau-levels',
  parameters: { ...small, ...parameters },
  numerics: { method },
});
const grid: Json = { kind: 'grid', cellsPerMagneticLength: 24, boxMagneticLengths: 7 };
const lorentzian: Json = { kind: 'lorentzian', hwhmEv: 0.006 };
const gaussian: Json = { kind: 'gaussian', sigmaEv: 0.006 };
const zeeman: Json = { kind: 'zeeman', gFactor: 2.3, tiltDeg: 35 };

export const landauLevelsGolden: GoldenJob[] = [
  golden('landau-massless', { system: monolayer(0, 0, 0), broadening: lorentzian }),
  golden('landau-massive-one-valley', {
    system: monolayer(0.03, 0, 0),
    valleys: 'K-prime',
    fieldT: range(-12, 12, 9),
    broadening: gaussian,
  }),
  golden('landau-crossed', {
    system: monolayer(0.02, 0.003, 0.07),
    fieldT: { kind: 'values', values: [1, 3.3, 3.5, 5, -8] },
    broadening: lorentzian,
  }),
  golden('landau-lorentzian-warm', { temperatureK: 50, broadening: lorentzian }),
  golden('landau-gaussian-cool', { temperatureK: 12, broadening: gaussian }),
  golden('landau-gaussian-hot', { temperatureK: 300, broadening: gaussian }),
  golden('landau-sharp-zeeman', { fieldT: 9, spin: zeeman, broadening: { kind: 'none' } }),
  golden('landau-sharp-warm', { spin: zeeman, temperatureK: 20, broadening: { kind: 'none' } }),
  golden('landau-ladder', { system: monolayer(0.03, 0, 0), broadening: lorentzian }, { kind: 'ladder', size: 30 }),
  golden('landau-grid', { fieldT: range(4, 12, 3), broadening: lorentzian }, grid),
  golden('landau-grid-crossed', { system: monolayer(0.02, 0.003, 0.07), fieldT: 10, broadening: lorentzian }, grid),
  golden('landau-bilayer', { system: bilayer(0, 0, 0, 0), broadening: lorentzian }),
  golden('landau-bilayer-quartic', { system: bilayer(0, 0.05, 0.06, 0.02), broadening: gaussian }),
  golden('landau-bilayer-skew', { system: bilayer(0.1, 0, 0, 0), fieldT: range(0, 4, 5), broadening: lorentzian }),
  golden(
    'landau-bilayer-skew-ladder',
    { system: bilayer(0.1, 0.05, 0.04, 0.02), fieldT: range(-2, 2, 4), broadening: lorentzian },
    { kind: 'ladder', size: 40 },
  ),
];
