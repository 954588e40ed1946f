import { expect, test } from 'vitest';
import { compileExpression, evaluateExpression } from './evaluate-expression.ts';
import type { Expression } from './expression.ts';
import type { Field } from './fields.ts';

const integer = { type: 'integer', min: 0, max: 999 } as const;
const model: { parameters: Field[]; numerics: Field[] } = {
  parameters: [
    { name: 'b', type: 'axis', unit: 'T', min: 0, max: 9, maxCount: 99 },
    { name: 'x', type: 'number', unit: 'nm', min: 0, max: 99 },
    { name: 'valleys', type: 'enum', values: ['K', 'both'] },
    {
      name: 'width',
      type: 'choice',
      kinds: [
        { kind: 'nm', members: [] },
        { kind: 'rows', members: [{ name: 'count', ...integer }] },
      ],
    },
    { name: 'states', type: 'list', items: integer, minItems: 0, maxItems: 9 },
    { name: 'on', type: 'boolean' },
  ],
  numerics: [{ name: 'scale', type: 'auto-number', unit: '', min: 0, max: 9 }],
};
const body = {
  parameters: {
    b: { kind: 'range', start: 0, stop: 1, count: 21 },
    x: 12,
    valleys: 'both',
    width: { kind: 'rows', count: 7 },
    states: [3, 5],
    on: true,
  },
  numerics: { scale: 4 },
};

test.each<[Expression, number]>([
  [3, 3],
  [{ read: '/parameters/b' }, 21],
  [{ read: '/parameters/b/count' }, 21],
  [{ read: '/parameters/x' }, 12],
  [{ read: '/parameters/width/count' }, 7],
  [{ read: '/parameters/states' }, 2],
  [{ read: '/parameters/states/1' }, 5],
  [{ read: '/parameters/on' }, 1],
  [{ read: '/numerics/scale' }, 4],
  [{ is: '/parameters/valleys', kind: 'both' }, 1],
  [{ is: '/parameters/width', kind: 'nm' }, 0],
  [{ is: '/parameters/b', kind: 'range' }, 1],
  [{ op: '-', args: [10, 3, 2] }, 5],
  [{ op: '-', args: [10] }, -10],
  [{ op: '/', args: [8, 2, 2] }, 2],
  [{ op: 'sqrt', args: [2.25] }, 1.5],
  [{ op: 'floor', args: [-1.5] }, -2],
  [{ op: 'min', args: [3, 1, 2] }, 1],
  [{ op: 'max', args: [3, { op: '*', args: [2, 4] }, { op: '+', args: [1, 1] }] }, 8],
])('%j is %d', (expression, value) => {
  expect(evaluateExpression(expression, model, body)).toBe(value);
});

test('an axis given as a bare number has one point; values count themselves', () => {
  const points = compileExpression({ read: '/parameters/b' }, model);
  expect(points({ ...body, parameters: { b: 5 } })).toBe(1);
  expect(points({ ...body, parameters: { b: { kind: 'values', values: [1, 2, 3] } } })).toBe(3);
  expect(evaluateExpression({ is: '/parameters/b', kind: 'number' }, model, { ...body, parameters: { b: 5 } })).toBe(1);
});

test('a member of a kind that is not chosen reads as 0', () => {
  const other = { ...body, parameters: { ...body.parameters, width: { kind: 'nm' } } };
  expect(evaluateExpression({ read: '/parameters/width/count' }, model, other)).toBe(0);
});

test('a misspelt pointer is refused when compiled, an enum has no number', () => {
  expect(() => compileExpression({ read: '/parameters/width/cuont' }, model)).toThrow(/nothing at/);
  expect(() => compileExpression({ is: '/width', kind: 'nm' }, model)).toThrow(/nothing at/);
  expect(() => evaluateExpression({ read: '/parameters/valleys' }, model, body)).toThrow(/"is"/);
});
