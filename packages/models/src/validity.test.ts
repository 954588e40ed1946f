import { describe, expect, test } from 'vitest';
import type { ValidityNote } from './definition.ts';
import { continuumRibbon } from './definitions/continuum-ribbon/definition.ts';
import { landauLevels } from './definitions/landau-levels/definition.ts';
import { formatQuantity } from './format-quantity.ts';
import { manifestOf } from './manifest.ts';
import { parseSpecification } from './parse-specification.ts';
import { titleOf } from './title-of.ts';
import { NoteCollector, noteText, validityOf } from './validity.ts';

test.each([
  [0, 'T', '0\u00a0T'],
  [0.16, 'eV', '0.16\u00a0eV'],
  [-12.34567, 'nm', '−12.35\u00a0nm'],
  [20001, '', '20001'],
  [1.25e-7, 'eV', '1.25×10⁻⁷\u00a0eV'],
  [1e12, '1/cm²', '1×10¹²\u00a01/cm²'],
  [30, 'deg', '30°'],
  [Number.NaN, '', 'no number'],
])('%d in %s is shown as %s', (value, unit, text) => {
  expect(formatQuantity(value, unit)).toBe(text);
});

const note = (code: string, severity: ValidityNote['severity'], value: number): ValidityNote => ({
  code,
  severity,
  field: '/parameters/x',
  value,
  limit: 1,
  unit: 'eV',
});

test('notes get their sentences, the gravest first', () => {
  const model = {
    noteTexts: { high: 'The energy {value} is above {limit}.' },
    notes: () => [note('low', 'note', 2), note('high', 'refuse', 3)],
  };
  expect(validityOf(model, { parameters: {}, numerics: {} }).map(({ text }) => text)).toEqual([
    'The energy 3\u00a0eV is above 1\u00a0eV.',
    'low: 2\u00a0eV against 1\u00a0eV.',
  ]);
  expect(noteText(model, note('high', 'note', 4))).toMatch(/4\u00a0eV/);
});

test('notes of many points are gathered with the worst', () => {
  const collector = new NoteCollector(2);
  collector.add(3, [note('a', 'caution', 2)]);
  collector.add(4, [note('a', 'caution', 5), note('b', 'refuse', 2)]);
  collector.add(9, [note('a', 'caution', 4)]);
  expect(collector.summary()).toEqual([
    expect.objectContaining({ code: 'b', severity: 'refuse', points: 1, firstPoints: [4] }),
    expect.objectContaining({ code: 'a', worst: 5, limit: 1, points: 3, firstPoints: [3, 4] }),
  ]);
});

describe('titles', () => {
  const manifest = manifestOf([landauLevels, continuumRibbon], '0');
  const title = (model: typeof landauLevels, parameters: object) => {
    const parsed = parseSpecification(manifest, { model: model.id, parameters, kernel: '0'.repeat(64) });
    if (!parsed.ok) throw new Error(JSON.stringify(parsed.problems));
    return titleOf(model, parsed.specification);
  };

  test.each([
    [landauLevels, {}, 'Landau levels'],
    [landauLevels, { fieldT: 10 }, 'Landau levels: B = 10\u00a0T'],
    [continuumRibbon, {}, 'Continuum ribbon: armchair, N = 40'],
    [
      continuumRibbon,
      { edge: { kind: 'zigzag' }, width: { kind: 'nm', widthNm: 60 }, fieldT: 10 },
      'Continuum ribbon: zigzag, W = 60\u00a0nm, B = 10\u00a0T',
    ],
    [
      continuumRibbon,
      { massEv: { kind: 'polynomial', coefficients: [1] } },
      'Continuum ribbon: armchair, N = 40, mass polynomial',
    ],
    [
      continuumRibbon,
      { kPerNm: { kind: 'range', start: -0.6, stop: 0.6, count: 241 } },
      'Continuum ribbon: armchair, N = 40, k −0.6…0.6\u00a01/nm (241)',
    ],
  ])('%#', (model, parameters, text) => {
    expect(title(model, parameters)).toBe(text);
  });
});
