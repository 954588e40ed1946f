import { describe, expect, it } from 'vitest';
import type { Json } from '../../fields.ts';
import { manifestOf } from '../../manifest.ts';
import { parseSpecification } from '../../parse-specification.ts';
import { validityOf } from '../../validity.ts';
import { landauLevels } from './definition.ts';

const manifest = manifestOf([landauLevels], '0');
type Members = { [name: string]: Json };
const cone = (members: Members = {}): Json => ({
  kind: 'monolayer',
  massEv: 0,
  electricFieldEvPerNm: 0,
  kPerNm: 0,
  ...members,
});
const bilayer = (v3Ratio: number): Json => ({
  kind: 'bilayer',
  gamma1Ev: 0.39,
  v3Ratio,
  v4Ratio: 0,
  biasEv: 0,
  dimerOffsetEv: 0,
});

function notesOf(parameters: Members, method: Json = { kind: 'auto' }) {
  const quiet = { fieldT: 1, levels: 2, broadening: { kind: 'none' }, carrierPerNm2: 0 };
  const input = {
    model: 'landau-levels',
    parameters: { ...quiet, ...parameters },
    numerics: { method },
    kernel: '0'.repeat(64),
  };
  const parsed = parseSpecification(manifest, input);
  if (!parsed.ok) throw new Error(JSON.stringify(parsed.problems));
  return validityOf(landauLevels, parsed.specification);
}

/** One question per note, with its severity and, where it is round, its limit. */
const cases: [string, string, Members, Json?][] = [
  ['no-field', 'caution', { fieldT: 0 }],
  ['cone-one-percent', 'note', { fieldT: 20 }],
  ['cone-five-percent', 'caution', { fieldT: 20, levels: 200 }],
  ['energies-beyond-levels', 'note', { energyEv: 1, broadening: { kind: 'lorentzian', hwhmEv: 0.001 } }],
  ['length-near-bonds', 'caution', { fieldT: 400 }],
  ['carriers-beyond-levels', 'caution', { carrierPerNm2: -0.05 }],
  ['lines-overlap', 'note', { broadening: { kind: 'gaussian', sigmaEv: 0.1 }, energyEv: 0 }],
  ['collapsed-everywhere', 'caution', { fieldT: 10, system: cone({ electricFieldEvPerNm: 0.0088 }) }],
  [
    'collapsed-below',
    'note',
    { fieldT: { kind: 'range', start: 0, stop: 10, count: 11 }, system: cone({ electricFieldEvPerNm: -0.004 }) },
  ],
  ['no-closed-form', 'refuse', { system: bilayer(0.1) }, { kind: 'closed-form' }],
  ['no-crossed-ladder', 'refuse', { system: cone({ electricFieldEvPerNm: 1e-5 }) }, { kind: 'ladder', size: 50 }],
  ['ladder-too-short', 'refuse', { levels: 20 }, { kind: 'ladder', size: 21 }],
  ['ladder-short', 'caution', { system: bilayer(0.1) }, { kind: 'ladder', size: 10 }],
  [
    'no-bilayer-grid',
    'refuse',
    { system: bilayer(0) },
    { kind: 'grid', cellsPerMagneticLength: 40, boxMagneticLengths: 8 },
  ],
  ['box-too-small', 'refuse', { levels: 50 }, { kind: 'grid', cellsPerMagneticLength: 40, boxMagneticLengths: 12 }],
  ['grid-coarse', 'caution', { levels: 10 }, { kind: 'grid', cellsPerMagneticLength: 8, boxMagneticLengths: 8 }],
];

describe('validity notes of landau-levels', () => {
  it.each(cases)('%s is a %s', (code, severity, parameters, method) => {
    const note = notesOf(parameters, method).find((candidate) => candidate.code === code);
    expect(note?.severity).toBe(severity);
    expect(note?.text).not.toMatch(/[{}]/);
  });

  it('has a case for every sentence, and a sentence for every case', () => {
    expect(cases.map(([code]) => code).sort()).toEqual(Object.keys(landauLevels.noteTexts).sort());
  });

  it('is silent about a question that lies well inside', () => {
    expect(notesOf({})).toEqual([]);
  });

  it('puts the collapse where |F| = v|B|', () => {
    // ħv = 0.5751 eV nm, F = 0.0087373 eV/nm: 10 T (V. Lukose, R. Shankar, G. Baskaran, PRL 98, 116802 (2007))
    const [note] = notesOf({ fieldT: 9, system: cone({ electricFieldEvPerNm: 0.0087373 }) });
    expect(note).toMatchObject({ code: 'collapsed-everywhere', value: 9, limit: expect.closeTo(10, 3) });
  });
});
