import type { PreviewReduction, WorkedExample } from '../../definition.ts';
import type { Json } from '../../fields.ts';

const monolayer: Json = { kind: 'monolayer', massEv: 0, electricFieldEvPerNm: 0, kPerNm: 0 };
const bilayer: Json = { kind: 'bilayer', gamma1Ev: 0.39, v3Ratio: 0, v4Ratio: 0, biasEv: 0, dimerOffsetEv: 0 };

/** i·10⁻⁴ for i = 0 … count − 1: a quotient of integers, so the double that the decimal text means. */
const tenThousandths = (count: number): Json[][] => Array.from({ length: count }, (_, i) => [i / 10_000]);

export const examples: WorkedExample[] = [
  {
    id: 'levels-that-grow-as-root-b',
    title: 'Levels that grow as √B',
    question: 'How far apart are the levels of a massless cone, and at which fillings are its Hall plateaus?',
    source:
      'J. W. McClure, Phys. Rev. 104, 666 (1956); V. P. Gusynin, S. G. Sharapov, PRL 95, 146801 (2005); measured by K. S. Novoselov et al., Nature 438, 197 (2005) and Y. Zhang et al., Nature 438, 201 (2005). E₁ = 36.283 meV·√B; ν = ±2, ±6, ±10.',
    parameters: {
      system: monolayer,
      valleys: 'both',
      spin: { kind: 'degenerate', factor: 2 },
      diracVelocityEvNm: 0.6582119569509067,
      fieldT: { kind: 'range', start: 0, stop: 20, count: 201 },
      levels: 10,
      broadening: { kind: 'lorentzian', hwhmEv: 0.005 },
      energyEv: { kind: 'range', start: -0.4, stop: 0.4, count: 801 },
      carrierPerNm2: { kind: 'range', start: -0.05, stop: 0.05, count: 201 },
      temperatureK: 0,
    },
  },
  {
    id: 'a-sideways-field-closes-the-ladder',
    title: 'A sideways field closes the ladder',
    question: 'What does an in-plane electric field do to the levels, and where do they collapse?',
    source: 'V. Lukose, R. Shankar, G. Baskaran, PRL 98, 116802 (2007). Collapse at F = vB = 0.0087373 eV/nm for 10 T.',
    parameters: {
      system: monolayer,
      fieldT: 10,
      levels: 5,
      carrierPerNm2: 0,
      energyEv: { kind: 'range', start: -0.4, stop: 0.4, count: 401 },
    },
    sweep: [{ pointers: ['/system/electricFieldEvPerNm'], values: tenThousandths(88) }],
  },
  {
    id: 'two-layers-and-a-bias',
    title: 'Two layers and a bias',
    question: 'How do the two zero modes of a bilayer part when its layers are held at different potentials?',
    source:
      'E. McCann, V. I. Fal’ko, PRL 96, 086805 (2006); J. M. Pereira, F. M. Peeters, P. Vasilopoulos, PRB 76, 115419 (2007). One mode stays exactly at the potential of its layer, ∓U/2 in K and K′.',
    parameters: {
      system: bilayer,
      fieldT: { kind: 'range', start: 0, stop: 20, count: 101 },
      levels: 8,
      energyEv: { kind: 'range', start: -0.3, stop: 0.3, count: 601 },
    },
    sweep: [{ pointers: ['/system/biasEv'], values: [[0], [0.02], [0.05], [0.1]] }],
  },
  {
    id: 'skew-hopping-at-low-field',
    title: 'Skew hopping at low field',
    question: 'Below which field does v₃ regroup the lowest levels of a bilayer into pockets?',
    source:
      'E. McCann, M. Koshino, Rep. Prog. Phys. 76, 056503 (2013). At 1 T and v₃ = 0.1 v the lowest positive levels are 3.158, 6.245 and 8.751 meV.',
    parameters: {
      system: { kind: 'bilayer', gamma1Ev: 0.39, v3Ratio: 0.1, v4Ratio: 0, biasEv: 0, dimerOffsetEv: 0 },
      fieldT: { kind: 'range', start: 0.05, stop: 5, count: 100 },
      levels: 8,
      carrierPerNm2: { kind: 'range', start: -0.005, stop: 0.005, count: 101 },
      broadening: { kind: 'gaussian', sigmaEv: 0.0005 },
      energyEv: { kind: 'range', start: -0.05, stop: 0.05, count: 501 },
    },
  },
];

export const preview: PreviewReduction[] = [
  { pointer: '/parameters/energyEv', axisCount: 201 },
  { pointer: '/parameters/carrierPerNm2', axisCount: 41 },
  { pointer: '/parameters/fieldT', axisCount: 51 },
  { pointer: '/parameters/fieldT', axisCount: 21 },
  { pointer: '/parameters/carrierPerNm2', axisCount: 5 },
  { pointer: '/parameters/levels', integer: 6 },
  { pointer: '/parameters/fieldT', axisCount: 7 },
];
