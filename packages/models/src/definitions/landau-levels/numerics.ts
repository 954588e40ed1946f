import type { Field } from '../../fields.ts';

export const numerics: Field[] = [
  {
    name: 'method',
    type: 'choice',
    default: { kind: 'auto' },
    kinds: [
      { kind: 'auto', display: { title: 'closed form where one exists', help: 'Else the ladder.' }, members: [] },
      { kind: 'closed-form', display: { title: 'closed form', help: 'Refused where none exists.' }, members: [] },
      {
        kind: 'ladder',
        display: { title: 'ladder', help: 'Matrix in the oscillator basis.' },
        members: [
          {
            name: 'size',
            type: 'integer',
            min: 4,
            max: 2000,
            default: 80,
            display: { symbol: 'N', title: 'ladder size', help: 'Oscillator states kept.' },
          },
        ],
      },
      {
        kind: 'grid',
        display: { title: 'grid', help: 'Staggered real-space grid; one layer only.' },
        members: [
          {
            name: 'cellsPerMagneticLength',
            type: 'integer',
            min: 4,
            max: 400,
            default: 40,
            display: { title: 'cells per magnetic length', help: 'Of the finest grid.' },
          },
          {
            name: 'boxMagneticLengths',
            type: 'number',
            unit: '',
            min: 2,
            max: 200,
            default: 8,
            display: { title: 'half box', help: 'In magnetic lengths, on either side of the orbit.' },
          },
        ],
      },
    ],
    display: { title: 'method', help: 'Independent routes to the same levels.', group: 'numerics' },
  },
];
