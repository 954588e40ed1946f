import type { Field } from '../../fields.ts';
import {
  axis,
  bondLengthNm,
  diracVelocityEvNm,
  grid,
  profile,
  spectrum,
  spin,
  temperatureK,
  valleys,
} from '../../shared-fields.ts';

/** Inputs of the ribbon model. */
export const parameters: Field[] = [
  {
    name: 'edge',
    type: 'choice',
    default: { kind: 'armchair' },
    kinds: [
      {
        kind: 'zigzag',
        display: { title: 'zigzag', help: 'One sublattice vanishes at each edge; valleys are separate.' },
        members: [],
      },
      {
        kind: 'armchair',
        display: { title: 'armchair', help: 'The edge mixes the valleys; both are computed at once.' },
        members: [],
      },
      {
        kind: 'infinite-mass',
        display: {
          title: 'infinite mass',
          help: 'No current through the edge; opposite signs hold one chiral mode.',
        },
        members: [
          {
            name: 'lowerSign',
            type: 'integer',
            min: -1,
            max: 1,
            default: 1,
            display: { symbol: 's_1', title: 'lower wall', help: 'Sign of the mass outside, +1 or −1.' },
          },
          {
            name: 'upperSign',
            type: 'integer',
            min: -1,
            max: 1,
            default: 1,
            display: { symbol: 's_2', title: 'upper wall', help: 'Sign of the mass outside, +1 or −1.' },
          },
        ],
      },
      {
        kind: 'periodic',
        display: { title: 'periodic', help: 'A superlattice; the field must average to zero over the period.' },
        members: [
          {
            name: 'blochPhaseRad',
            type: 'number',
            unit: 'rad',
            min: -7,
            max: 7,
            default: 0,
            display: { symbol: '\\theta', title: 'Bloch phase', help: 'Across one period.' },
          },
        ],
      },
    ],
    display: { title: 'edge', help: 'How the wave ends at the two sides.', group: 'geometry' },
  },
  valleys('both'),
  {
    name: 'width',
    type: 'choice',
    default: { kind: 'dimer-lines', count: 40 },
    kinds: [
      {
        kind: 'nm',
        display: { title: 'in nm', help: 'Between the points where the wave vanishes.' },
        members: [
          {
            name: 'widthNm',
            type: 'number',
            unit: 'nm',
            min: 0,
            exclusiveMin: true,
            max: 10000,
            default: 20,
            display: { symbol: 'W', title: 'width', help: 'Between the points where the wave vanishes.' },
          },
        ],
      },
      {
        kind: 'dimer-lines',
        display: { title: 'dimer lines', help: 'Armchair: W = (N + 1)·√3·a₀/2.' },
        members: [
          {
            name: 'count',
            type: 'integer',
            min: 2,
            max: 20000,
            default: 40,
            display: { symbol: 'N', title: 'dimer lines', help: 'N = 3p + 2 is metallic without field.' },
          },
        ],
      },
      {
        kind: 'zigzag-chains',
        display: { title: 'zigzag chains', help: 'Zigzag: two conventions for the width.' },
        members: [
          {
            name: 'count',
            type: 'integer',
            min: 2,
            max: 20000,
            default: 40,
            display: { symbol: 'N', title: 'chains', help: 'Zigzag rows across the strip.' },
          },
          {
            name: 'rule',
            type: 'enum',
            values: ['matching', 'geometric'],
            default: 'matching',
            display: { title: 'rule', help: 'matching: (3N/2 + 3/4)·a₀; geometric: (3N/2 + 1)·a₀.' },
          },
        ],
      },
    ],
    display: { symbol: 'W', title: 'width', help: 'In nm or counted in atoms.', group: 'geometry' },
  },
  diracVelocityEvNm,
  bondLengthNm,
  {
    name: 'fieldT',
    type: 'number',
    unit: 'T',
    min: -1000,
    max: 1000,
    default: 0,
    display: { symbol: 'B', title: 'magnetic field', help: 'Uniform, normal to the sheet.', group: 'fields' },
  },
  axis(
    'kPerNm',
    '1/nm',
    -20,
    20,
    { kind: 'range', start: -1, stop: 1, count: 201 },
    {
      symbol: 'k',
      title: 'along the strip',
      help: 'Wave number, from the valley for zigzag and infinite mass; odd counts put k = 0 on the axis.',
      group: 'request',
    },
    20001,
  ),
  profile('potentialEv', 'eV', {
    symbol: 'V',
    title: 'potential',
    help: 'Across the strip, u from the centre.',
    group: 'fields',
  }),
  profile('massEv', 'eV', {
    symbol: 'm',
    title: 'mass',
    help: '+m on A, −m on B, the same in both valleys.',
    group: 'fields',
  }),
  profile('valleyMassEv', 'eV', {
    symbol: '\\tau m',
    title: 'valley-odd mass',
    help: 'Changes sign with the valley.',
    group: 'fields',
  }),
  profile('gaugePerNm', '1/nm', {
    symbol: '\\mathcal{A}',
    title: 'strain gauge field',
    help: 'Vector potential of strain, in the sign of K; opposite in K′.',
    group: 'fields',
  }),
  profile('fieldProfileT', 'T', {
    symbol: 'B(u)',
    title: 'field profile',
    help: 'Added to the uniform field.',
    group: 'fields',
  }),
  spin,
  axis(
    'energyEv',
    'eV',
    -20,
    20,
    { kind: 'range', start: -0.3, stop: 0.3, count: 121 },
    {
      symbol: 'E',
      title: 'energies of the channels',
      help: 'Where the open channels are counted.',
      group: 'request',
    },
    5001,
  ),
  temperatureK,
  spectrum({ kind: 'nearest', energyEv: 0, count: 8 }),
];

export const numerics: Field[] = [
  grid(200),
  {
    name: 'states',
    type: 'list',
    items: { type: 'integer', min: 0, max: 20000 },
    minItems: 0,
    maxItems: 64,
    default: [],
    display: {
      title: 'densities at',
      help: 'Indices on the k axis whose densities across the strip are returned.',
      group: 'numerics',
    },
  },
];
