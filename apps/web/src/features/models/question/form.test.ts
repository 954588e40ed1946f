import { findModel, models } from '@nightcone/models';
import { expect, test } from 'vitest';
import { checkForm } from './check-form.ts';
import { fillForm, questionOfExample } from './fill-form.ts';
import { kindName, togetherName, writeBody } from './form-texts.ts';
import { readForm } from './read-form.ts';

const ribbon = findModel('continuum-ribbon') as NonNullable<ReturnType<typeof findModel>>;
const landau = findModel('landau-levels') as NonNullable<ReturnType<typeof findModel>>;

test.each(models)('the defaults of $id survive being written and read', (model) => {
  const checked = checkForm(model, writeBody(model, {}), null);
  expect(checked.problems).toEqual([]);
  for (const part of ['parameters', 'numerics'] as const)
    for (const field of model[part]) expect(checked.specification?.[part][field.name]).toBeDefined();
});

test('texts of other kinds are kept while another kind is chosen', () => {
  const texts = writeBody(ribbon, {});
  texts['parameters/width:nm/widthNm'] = '33 nm';
  texts[kindName('parameters/width')] = 'nm';
  expect(readForm(ribbon, texts).parameters.width).toEqual({ kind: 'nm', widthNm: 33 });
  texts[kindName('parameters/width')] = 'dimer-lines';
  expect(readForm(ribbon, texts).parameters.width).toEqual({ kind: 'dimer-lines', count: 40 });
  expect(texts['parameters/width:nm/widthNm']).toBe('33 nm');
});

test('units are shifted in the decimal text', () => {
  const texts = { ...writeBody(landau, {}), 'parameters/system:monolayer/massEv': '0.9 meV' };
  expect(readForm(landau, texts).parameters.system).toMatchObject({ massEv: 0.0009 });
});

test('a range in a number field is a sweep with decimal ends', () => {
  const texts = { ...writeBody(ribbon, {}), 'parameters/fieldT': '2..14 T / 25' };
  const checked = checkForm(ribbon, texts, null);
  expect(checked.axes).toEqual([{ pointers: ['/fieldT'], range: { start: '2', stop: '14', count: 25 } }]);
  expect(checked.specification?.parameters.fieldT).toBe(2);
  expect(checked.plan?.count).toBe(25);
});

test('a range of counts that are not whole is refused in words', () => {
  const texts = { ...writeBody(ribbon, {}), 'parameters/width:dimer-lines/count': '10..20 / 4' };
  expect(checkForm(ribbon, texts, null).problems).toEqual([
    { name: 'parameters/width:dimer-lines/count', message: expect.stringContaining('not all whole') },
  ]);
});

test('what is out of range names its control and the allowed range', () => {
  const texts = { ...writeBody(ribbon, {}), 'parameters/fieldT': '5000', 'numerics/grid:extrapolated/cells': '2' };
  const problems = checkForm(ribbon, texts, null).problems;
  expect(problems.map(({ name }) => name)).toEqual(['parameters/fieldT', 'numerics/grid:extrapolated/cells']);
  expect(problems[0]?.message).toContain('-1000 to 1000');
});

test('two lists of equal length can vary together', () => {
  const texts = {
    ...writeBody(ribbon, {}),
    'parameters/fieldT': '1, 2, 3',
    'parameters/temperatureK': '0, 4, 8',
    [togetherName('parameters/temperatureK')]: 'parameters/fieldT',
  };
  expect(checkForm(ribbon, texts, null).axes).toEqual([
    {
      pointers: ['/fieldT', '/temperatureK'],
      values: [
        [1, 0],
        [2, 4],
        [3, 8],
      ],
    },
  ]);
});

test('a sweep fills the form with its range and comes back the same', () => {
  const axes = [{ pointers: ['/width/count'], range: { start: '10', stop: '69', count: 60 } }];
  const texts = fillForm(ribbon, { axes });
  expect(texts['parameters/width:dimer-lines/count']).toBe('10..69 / 60');
  expect(checkForm(ribbon, texts, null).axes).toEqual(axes);
  const listed = fillForm(ribbon, { axes: [{ pointers: ['/fieldT'], values: [[0.1], [0.2], [0.3]] }] });
  expect(listed['parameters/fieldT']).toBe('0.1..0.3 / 3');
});

test('an axis that no control can hold is kept as it is', () => {
  const axes = [{ pointers: ['/edge'], values: [[{ kind: 'zigzag' }], [{ kind: 'armchair' }]] }];
  const checked = checkForm(ribbon, fillForm(ribbon, { axes }), null);
  expect(checked.axes).toEqual(axes);
  expect(checked.plan?.count).toBe(2);
});

test('every worked example fills the form without a problem', () => {
  for (const model of models)
    for (const example of model.examples) {
      const checked = checkForm(model, fillForm(model, questionOfExample(example)), null);
      expect(checked.problems, example.id).toEqual([]);
      expect(checked.plan?.count, example.id).toBe(
        (example.sweep ?? []).reduce((product, axis) => product * axis.values.length, 1),
      );
    }
});
