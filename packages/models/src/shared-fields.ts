import type { Display, Field, Json } from './fields.ts';

/** Fields that several models share, so that they mean the same everywhere (models.md, shared rules). */

export const bondLengthNm: Field = {
  name: 'bondLengthNm',
  type: 'number',
  unit: 'nm',
  min: 0,
  exclusiveMin: true,
  max: 10,
  default: 0.142,
  display: {
    symbol: 'a_0',
    title: 'bond length',
    help: 'Distance between neighbouring atoms; it sets the valley phase of an armchair edge.',
    group: 'material',
  },
};

export const diracVelocityEvNm: Field = {
  name: 'diracVelocityEvNm',
  type: 'number',
  unit: 'eV nm',
  min: 1e-6,
  max: 100,
  default: 0.5751,
  display: {
    symbol: '\\hbar v',
    title: 'Dirac velocity',
    help: 'Slope of the cone, ħv. 0.5751 eV nm is 3·a₀·t/2 for a₀ = 0.142 nm and t = 2.7 eV; 0.65821 eV nm is v = 10⁶ m/s.',
    group: 'material',
  },
};

export const valleys = (fallback: 'K' | 'K-prime' | 'both'): Field => ({
  name: 'valleys',
  type: 'enum',
  values: ['K', 'K-prime', 'both'],
  default: fallback,
  display: {
    symbol: '\\tau',
    title: 'valleys',
    help: 'Which band crossings are computed: K, K′ or both.',
    group: 'material',
  },
});

export const spin: Field = {
  name: 'spin',
  type: 'choice',
  default: { kind: 'degenerate', factor: 2 },
  kinds: [
    {
      kind: 'degenerate',
      display: { title: 'degenerate', help: 'Each level is counted this many times.' },
      members: [
        {
          name: 'factor',
          type: 'integer',
          min: 1,
          max: 2,
          default: 2,
          display: { symbol: 'g_s', title: 'spin factor', help: '2: both spins; 1: a one-cone surface.' },
        },
      ],
    },
    {
      kind: 'zeeman',
      display: {
        title: 'split by the field',
        help: 'E ± (g/2) μ_B B; the spin sees the whole field, the orbit only its normal part.',
      },
      members: [
        {
          name: 'gFactor',
          type: 'number',
          unit: '',
          min: -100,
          max: 100,
          default: 2,
          display: { symbol: 'g', title: 'g factor', help: 'Landé factor of the electron in the sheet.' },
        },
        {
          name: 'tiltDeg',
          type: 'number',
          unit: 'deg',
          min: 0,
          max: 89,
          default: 0,
          display: {
            symbol: '\\vartheta',
            title: 'tilt',
            help: 'Angle between field and normal; the whole field is B / cos ϑ.',
          },
        },
      ],
    },
  ],
  display: { symbol: 's', title: 'spin', help: 'Counted or split.', group: 'fields' },
};

/** Transverse or radial function of u = position − centre in nm. */
export const profile = (name: string, unit: string, display: Display): Field => ({
  name,
  type: 'choice',
  default: { kind: 'none' },
  display,
  kinds: [
    { kind: 'none', display: { title: 'none', help: 'Zero everywhere.' }, members: [] },
    {
      kind: 'polynomial',
      display: { title: 'polynomial', help: 'Sum of coefficient × uⁿ, u from the centre in nm.' },
      members: [
        {
          name: 'coefficients',
          type: 'list',
          items: { type: 'number', unit, min: -1e6, max: 1e6 },
          minItems: 1,
          maxItems: 12,
          default: [0],
          display: { title: 'coefficients', help: `Of u⁰, u¹, u² …, in ${unit} per nmⁿ.` },
        },
      ],
    },
    {
      kind: 'steps',
      display: { title: 'steps', help: 'Constant between edges.' },
      members: [
        {
          name: 'edges',
          type: 'list',
          items: { type: 'number', unit: 'nm', min: -1e5, max: 1e5 },
          minItems: 1,
          maxItems: 200,
          default: [0],
          display: { title: 'edges', help: 'Increasing positions u in nm.' },
        },
        {
          name: 'values',
          type: 'list',
          items: { type: 'number', unit, min: -1e6, max: 1e6 },
          minItems: 2,
          maxItems: 201,
          default: [0, 0],
          display: { title: 'values', help: `One more than edges, from left to right, in ${unit}.` },
        },
      ],
    },
    {
      kind: 'sine',
      display: { title: 'sine', help: 'amplitude · sin(2πu/period + phase).' },
      members: [
        {
          name: 'amplitude',
          type: 'number',
          unit,
          min: -1e6,
          max: 1e6,
          default: 0,
          display: { title: 'amplitude', help: `In ${unit}.` },
        },
        {
          name: 'periodNm',
          type: 'number',
          unit: 'nm',
          min: 0,
          exclusiveMin: true,
          max: 1e5,
          default: 10,
          display: { title: 'period', help: 'In nm.' },
        },
        {
          name: 'phase',
          type: 'number',
          unit: 'rad',
          min: -100,
          max: 100,
          default: 0,
          display: { title: 'phase', help: 'In rad at the centre.' },
        },
      ],
    },
    {
      kind: 'table',
      display: { title: 'table', help: 'Two columns, monotone cubic between the rows, refused outside them.' },
      members: [
        {
          name: 'table',
          type: 'table',
          columns: [
            { role: 'x', unit: 'nm' },
            { role: 'value', unit },
          ],
          display: { title: 'table', help: 'An uploaded table, by its digest.' },
        },
      ],
    },
  ],
});

export const spectrum = (fallback: Json): Field => ({
  name: 'spectrum',
  type: 'choice',
  default: fallback,
  kinds: [
    {
      kind: 'window',
      display: { title: 'all in a window', help: 'Every level with eMin ≤ E < eMax, proved complete by counting.' },
      members: [
        {
          name: 'eMin',
          type: 'number',
          unit: 'eV',
          min: -100,
          max: 100,
          default: -0.3,
          display: { symbol: 'E_{\\min}', title: 'from', help: 'Lower edge, included.' },
        },
        {
          name: 'eMax',
          type: 'number',
          unit: 'eV',
          min: -100,
          max: 100,
          default: 0.3,
          display: { symbol: 'E_{\\max}', title: 'to', help: 'Upper edge, left out.' },
        },
      ],
    },
    {
      kind: 'nearest',
      display: { title: 'nearest to an energy', help: 'Ordered by distance, ties with the lower energy first.' },
      members: [
        {
          name: 'energyEv',
          type: 'number',
          unit: 'eV',
          min: -100,
          max: 100,
          default: 0,
          display: { symbol: 'E_0', title: 'energy', help: 'Levels are counted from here.' },
        },
        {
          name: 'count',
          type: 'integer',
          min: 1,
          max: 400,
          default: 8,
          display: { title: 'count', help: 'How many levels at each point.' },
        },
      ],
    },
  ],
  display: { symbol: 'E', title: 'levels', help: 'Which part of the spectrum is returned.', group: 'request' },
});

/** Three grids (cells, 2·cells, 4·cells) with an error estimate, or one grid without. */
export const grid = (cells: number): Field => ({
  name: 'grid',
  type: 'choice',
  default: { kind: 'extrapolated', cells },
  kinds: [
    {
      kind: 'extrapolated',
      display: {
        title: 'three, extrapolated',
        help: 'cells, 2·cells and 4·cells; the limit and its error are estimated.',
      },
      members: [
        {
          name: 'cells',
          type: 'integer',
          min: 8,
          max: 20000,
          default: cells,
          display: { symbol: 'M', title: 'cells', help: 'Of the coarsest of the three grids.' },
        },
      ],
    },
    {
      kind: 'single',
      display: { title: 'one', help: 'One grid, no error estimate.' },
      members: [
        {
          name: 'cells',
          type: 'integer',
          min: 8,
          max: 80000,
          default: cells,
          display: { symbol: 'M', title: 'cells', help: 'Of the only grid.' },
        },
      ],
    },
  ],
  display: { symbol: 'M', title: 'grid', help: 'Cells across the system.', group: 'numerics' },
});

export const axis = (
  name: string,
  unit: string,
  min: number,
  max: number,
  fallback: Json,
  display: Display,
  maxCount = 20001,
): Field => ({
  name,
  type: 'axis',
  unit,
  min,
  max,
  maxCount,
  default: fallback,
  display,
});

export const temperatureK: Field = {
  name: 'temperatureK',
  type: 'number',
  unit: 'K',
  min: 0,
  max: 3000,
  default: 0,
  display: {
    symbol: 'T',
    title: 'temperature',
    help: 'Of the occupation only; 0 is the sharp step.',
    group: 'request',
  },
};
