/** Questions that take milliseconds and reach the options that change what the host encodes and names. */
export const smallQuestions = [
  {
    name: 'fan of one layer',
    specification: {
      model: 'landau-levels',
      parameters: {
        fieldT: { kind: 'range', start: 0, stop: 10, count: 11 },
        energyEv: { kind: 'range', start: -0.2, stop: 0.2, count: 21 },
        carrierPerNm2: { kind: 'values', values: [-0.01, 0, 0.01] },
        levels: 3,
      },
    },
  },
  {
    name: 'two layers with a bias',
    specification: {
      model: 'landau-levels',
      parameters: {
        system: { kind: 'bilayer', biasEv: 0.05, v3Ratio: 0.1 },
        fieldT: 5,
        spin: { kind: 'zeeman' },
        broadening: { kind: 'none' },
        levels: 2,
      },
    },
  },
  {
    name: 'armchair ribbon',
    specification: {
      model: 'continuum-ribbon',
      parameters: {
        width: { kind: 'dimer-lines', count: 13 },
        kPerNm: { kind: 'range', start: -0.5, stop: 0.5, count: 11 },
        spectrum: { kind: 'nearest', count: 4 },
      },
      numerics: { grid: { kind: 'extrapolated', cells: 40 } },
    },
  },
  {
    name: 'zigzag ribbon with field, potential and densities',
    specification: {
      model: 'continuum-ribbon',
      parameters: {
        edge: { kind: 'zigzag' },
        width: { kind: 'nm', widthNm: 30 },
        fieldT: 10,
        potentialEv: { kind: 'polynomial', coefficients: [0, 0.001] },
        kPerNm: { kind: 'values', values: [-0.2, 0, 0.3] },
        spectrum: { kind: 'window', eMin: -0.15, eMax: 0.15 },
      },
      numerics: { grid: { kind: 'single', cells: 60 }, states: [1] },
    },
  },
];
