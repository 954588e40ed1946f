import type { CheckDefinition, ResultArray } from '../../definition.ts';

/** A companion of `name`: 1 where its entry exists, 0 where it is absent (and holds 0). */
const validity = (name: string, dims: string[]): ResultArray => ({
  name: `${name}Valid`,
  dtype: 'u8',
  dims,
  unit: '',
  display: { title: `${name} exists` },
});

/** In the order of the kernel's array numbers; append only. */
export const results: ResultArray[] = [
  { name: 'fieldT', dtype: 'f64', dims: ['field'], unit: 'T', display: { title: 'magnetic field', symbol: 'B' } },
  { name: 'energyEv', dtype: 'f64', dims: ['energy'], unit: 'eV', display: { title: 'energy', symbol: 'E' } },
  {
    name: 'carrierPerNm2',
    dtype: 'f64',
    dims: ['carrier'],
    unit: '1/nm²',
    display: { title: 'carrier density', symbol: 'n_e', help: 'Counted from neutrality.' },
  },
  {
    name: 'valleySign',
    dtype: 'i32',
    dims: ['valley'],
    unit: '',
    display: { title: 'valley', symbol: '\\tau', help: '1 is K, −1 is K′.' },
  },
  {
    name: 'spinSign',
    dtype: 'i32',
    dims: ['spin'],
    unit: '',
    display: { title: 'spin', symbol: 's', help: '1 along the field, −1 against it, 0 counted by a factor.' },
  },
  {
    name: 'levelIndex',
    dtype: 'i32',
    dims: ['level'],
    unit: '',
    display: {
      title: 'level',
      symbol: 'n',
      help: 'One layer: n. Two layers: counted from half filling, without 0; −1 and 1 are the zero modes of U = 0.',
    },
  },
  {
    name: 'energies',
    dtype: 'f64',
    dims: ['field', 'valley', 'spin', 'level'],
    unit: 'eV',
    display: { title: 'Landau levels', symbol: 'E_n' },
  },
  validity('energies', ['field', 'valley', 'spin', 'level']),
  {
    name: 'energyErrorEv',
    dtype: 'f64',
    dims: ['field', 'valley', 'level'],
    unit: 'eV',
    display: {
      title: 'error of the levels',
      help: 'Proved interval plus what a longer ladder or a finer grid changes.',
    },
  },
  {
    name: 'density',
    dtype: 'f64',
    dims: ['field', 'energy'],
    unit: '1/(eV nm²)',
    display: {
      title: 'density of states',
      symbol: '\\rho',
      help: 'Of the listed levels; left out without broadening.',
    },
  },
  validity('density', ['field', 'energy']),
  {
    name: 'chargeDensity',
    dtype: 'f64',
    dims: ['field', 'energy'],
    unit: '1/nm²',
    display: { title: 'charge density', symbol: 'n_e(E)', help: 'Electrons at this Fermi energy, from neutrality.' },
  },
  validity('chargeDensity', ['field', 'energy']),
  {
    name: 'hallPlateaus',
    dtype: 'f64',
    dims: ['field', 'energy'],
    unit: 'e²/h',
    display: {
      title: 'Hall plateaus',
      symbol: '\\sigma_{xy}',
      help: 'Magnitude for sharp levels at zero temperature with the Fermi energy at E.',
    },
  },
  validity('hallPlateaus', ['field', 'energy']),
  {
    name: 'fermiEnergy',
    dtype: 'f64',
    dims: ['field', 'carrier'],
    unit: 'eV',
    display: {
      title: 'Fermi energy',
      symbol: 'E_F',
      help: 'At the carrier density, temperature and line width given.',
    },
  },
  validity('fermiEnergy', ['field', 'carrier']),
  {
    name: 'fillingFactors',
    dtype: 'f64',
    dims: ['field', 'carrier'],
    unit: '',
    display: { title: 'filling factor', symbol: '\\nu', help: 'Carriers per flux quantum.' },
  },
  validity('fillingFactors', ['field', 'carrier']),
  {
    name: 'transitionFrom',
    dtype: 'i32',
    dims: ['transition'],
    unit: '',
    display: { title: 'from level' },
  },
  { name: 'transitionTo', dtype: 'i32', dims: ['transition'], unit: '', display: { title: 'to level' } },
  {
    name: 'transitions',
    dtype: 'f64',
    dims: ['field', 'valley', 'transition'],
    unit: 'eV',
    display: { title: 'transition energies', help: 'Allowed optically: |n| changes by one.' },
  },
  validity('transitions', ['field', 'valley', 'transition']),
  {
    name: 'magneticLengthNm',
    dtype: 'f64',
    dims: ['field'],
    unit: 'nm',
    display: { title: 'magnetic length', symbol: 'l_B' },
  },
  validity('magneticLengthNm', ['field']),
  {
    name: 'degeneracyPerNm2',
    dtype: 'f64',
    dims: ['field'],
    unit: '1/nm²',
    display: { title: 'states per level', help: 'Per valley and spin: e|B|/h.' },
  },
];

/** Numbers of the certificate, in the kernel's order. */
export const certificate = [
  { name: 'levelsWanted', unit: '' },
  { name: 'levelsFound', unit: '' },
  { name: 'largestErrorEv', unit: 'eV' },
];

/** In the order of the kernel's check numbers; append only. */
export const checks: CheckDefinition[] = [
  {
    code: 'ladder-difference',
    unit: 'eV',
    display: {
      title: 'levels against the matrix in the oscillator basis',
      source: 'J. W. McClure, Phys. Rev. 104, 666 (1956)',
    },
  },
  {
    code: 'grid-difference',
    unit: 'eV',
    display: {
      title: 'levels against a staggered grid in real space',
      source: 'L. Susskind, Phys. Rev. D 16, 3031 (1977), staggered first-order operator',
    },
  },
  {
    code: 'crossed-field-collapse',
    unit: '',
    display: {
      title: 'first spacing on the grid against (1 − β²)^¾',
      source: 'V. Lukose, R. Shankar, G. Baskaran, PRL 98, 116802 (2007)',
    },
  },
  {
    code: 'two-band-limit',
    unit: 'eV',
    display: {
      title: 'lowest bilayer level against ħω_c √2 in the smallest field',
      source: 'E. McCann, V. I. Fal’ko, PRL 96, 086805 (2006)',
    },
  },
  {
    code: 'zero-mode-valley',
    unit: 'eV',
    display: {
      title: 'the zero mode at the energy of the sublattice or layer it lives on',
      source: 'F. D. M. Haldane, PRL 61, 2015 (1988)',
    },
  },
  {
    code: 'carrier-round-trip',
    unit: '1/nm²',
    display: { title: 'carrier density at the Fermi energy found', source: 'definition of the Fermi energy' },
  },
];
