import { findModel, models, type SpecificationBody } from '@nightcone/models';
import { expect, test } from 'vitest';
import { describeInputs, valueText } from './describe-inputs.ts';

test('every input of every model is told, and defaults are known as such', () => {
  for (const model of models) {
    const body = {
      parameters: Object.fromEntries(model.parameters.map((field) => [field.name, field.default ?? null])),
      numerics: Object.fromEntries(model.numerics.map((field) => [field.name, field.default ?? null])),
    } as SpecificationBody;
    const rows = describeInputs(model, body);
    expect(new Set(rows.map((row) => row.pointer)).size).toBe(rows.length);
    expect(rows.length).toBeGreaterThanOrEqual(model.parameters.length + model.numerics.length);
    expect(rows.filter((row) => row.pointer.split('/').length === 3 && !row.isDefault)).toEqual([]);
  }
});

test('a changed member of a choice is a changed input, the others stay defaults', () => {
  const model = findModel('continuum-ribbon');
  if (!model) throw new Error('continuum-ribbon is missing');
  const rows = describeInputs(model, {
    parameters: { fieldT: 12, width: { kind: 'nm', widthNm: 100 } },
    numerics: {},
  });
  expect(rows.map((row) => row.pointer)).toContain('/parameters/width/widthNm');
  expect(rows.find((row) => row.pointer === '/parameters/width/widthNm')?.value).toBe('100 nm');
  expect(rows.find((row) => row.pointer === '/parameters/fieldT')).toMatchObject({ isDefault: false });
});

test('axes, lists and names of valleys', () => {
  expect(valueText({ type: 'axis', unit: 'T' }, { kind: 'range', start: 0, stop: 20, count: 201 })).toBe(
    '0 … 20 T / 201',
  );
  expect(valueText({ type: 'list' }, [1, 2, 3, 4, 5, 6, 7])).toBe('1, 2, 3, 4, 5, 6, … (7)');
  expect(valueText({ type: 'enum' }, 'K-prime')).toBe('K′');
  expect(valueText({ type: 'auto-number', unit: 'eV' }, { kind: 'auto' })).toBe('auto');
});
