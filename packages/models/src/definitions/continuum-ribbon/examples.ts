import type { PreviewReduction, WorkedExample } from '../../definition.ts';
import type { Json } from '../../fields.ts';

const count = (from: number, to: number): Json[][] => Array.from({ length: to - from + 1 }, (_, i) => [from + i]);
/** i·10⁻⁴: a quotient of integers, so the double that the decimal text means. */
const tenThousandths = (values: number): number[] => Array.from({ length: values }, (_, i) => i / 10_000);

export const examples: WorkedExample[] = [
  {
    id: 'armchair-subbands-by-width',
    title: 'Armchair subbands by width',
    question: 'How do the subbands and the gap of an armchair ribbon change with its width, family by family?',
    source: 'L. Brey, H. A. Fertig, PRB 73, 235411 (2006): q = nπ/W − 4π/3a; N = 3p + 2 has no gap.',
    parameters: {
      edge: { kind: 'armchair' },
      width: { kind: 'dimer-lines', count: 40 },
      kPerNm: { kind: 'range', start: -1, stop: 1, count: 201 },
      spectrum: { kind: 'nearest', energyEv: 0, count: 8 },
    },
    numerics: { grid: { kind: 'extrapolated', cells: 200 }, states: [] },
    sweep: [{ pointers: ['/width/count'], values: count(10, 69) }],
  },
  {
    id: 'where-the-hall-current-flows',
    title: 'Where the Hall current flows',
    question:
      'How do Landau levels bend up at the edges of a zigzag strip, and in which valley does the lowest one move?',
    source:
      'L. Brey, H. A. Fertig, PRB 73, 195408 (2006). Valley K at k = 0.3 nm⁻¹: 0.037146, 0.121885 and 0.172331 eV.',
    parameters: {
      edge: { kind: 'zigzag' },
      valleys: 'both',
      width: { kind: 'nm', widthNm: 60 },
      fieldT: 10,
      kPerNm: { kind: 'range', start: -0.6, stop: 0.6, count: 241 },
      energyEv: { kind: 'range', start: -0.24, stop: 0.24, count: 121 },
      spectrum: { kind: 'window', eMin: -0.25, eMax: 0.25 },
    },
    numerics: { grid: { kind: 'extrapolated', cells: 400 }, states: [120, 180, 212] },
  },
  {
    id: 'a-sideways-field-in-a-strip',
    title: 'A sideways field, by another route',
    question: 'Does a wide strip in a crossed field show the same collapse as the closed form of the Landau ladder?',
    source: 'V. Lukose, R. Shankar, G. Baskaran, PRL 98, 116802 (2007). Collapse at F = vB = 0.0087373 eV/nm for 10 T.',
    parameters: {
      edge: { kind: 'infinite-mass', lowerSign: 1, upperSign: 1 },
      width: { kind: 'nm', widthNm: 150 },
      fieldT: 10,
      kPerNm: 0,
      potentialEv: { kind: 'polynomial', coefficients: [0, 0] },
      spectrum: { kind: 'nearest', energyEv: 0, count: 11 },
    },
    sweep: [{ pointers: ['/potentialEv/coefficients/1'], values: tenThousandths(88).map((value) => [value]) }],
  },
  {
    id: 'one-way-mode-of-a-mass-domain',
    title: 'A one-way mode between two masses',
    question: 'What runs along a strip whose two sides carry masses of opposite sign?',
    source: 'M. V. Berry, R. J. Mondragon, Proc. R. Soc. A 412, 53 (1987). E = ħvk in K, −ħvk in K′.',
    parameters: {
      edge: { kind: 'infinite-mass', lowerSign: 1, upperSign: -1 },
      width: { kind: 'nm', widthNm: 30 },
      kPerNm: { kind: 'range', start: -0.3, stop: 0.3, count: 121 },
      spectrum: { kind: 'window', eMin: -0.2, eMax: 0.2 },
    },
    sweep: [{ pointers: ['/fieldT'], values: [[0], [2], [4], [6], [8], [10]] }],
  },
];

export const preview: PreviewReduction[] = [
  { pointer: '/numerics/grid', singleGridCells: 100 },
  { pointer: '/parameters/kPerNm', axisCount: 61 },
  { pointer: '/parameters/energyEv', axisCount: 41 },
  { pointer: '/parameters/kPerNm', axisCount: 31 },
  { pointer: '/parameters/spectrum', nearestCount: 8 },
  { pointer: '/parameters/kPerNm', axisCount: 15 },
  { pointer: '/numerics/grid', singleGridCells: 60 },
];
