import type { Field, KernelManifest } from '@nightcone/models';
import { describe, expect, it } from 'vitest';
import { encodeSpecification } from './encode-specification.ts';
import { KernelRefusal, type Tables } from './types.ts';

const number = (name: string): Field => ({ name, type: 'number', unit: '', min: -10, max: 10 });

function manifestOf(parameters: Field[], numerics: Field[] = []): KernelManifest {
  const rest = { results: [], certificate: [], checks: [], sliceCount: 1, cost: 1, assembleCost: 1 };
  const sizes = { sliceBytes: 1, assembleBytes: 1, resultBytes: 1 };
  const empty = { id: 'first', parameters: [], numerics: [], ...rest, ...sizes };
  return { interface: 1, version: '0', models: [empty, { ...empty, id: 'second', parameters, numerics }] };
}

/** Doubles behind the header. */
function encoded(
  parameters: Field[],
  values: object,
  numerics: Field[] = [],
  numericValues: object = {},
  tables?: Tables,
) {
  const body = { model: 'second', parameters: values, numerics: numericValues };
  const bytes = encodeSpecification(manifestOf(parameters, numerics), body, tables);
  return [...new Float64Array(bytes.buffer, 16)];
}

describe('encodeSpecification', () => {
  it('writes magic, interface and model index', () => {
    const bytes = encodeSpecification(manifestOf([]), { model: 'second', parameters: {}, numerics: {} });
    expect([...bytes]).toEqual([0x4e, 0x43, 0x52, 0x31, 1, 0, 0, 0, 1, 0, 0, 0, 0, 0, 0, 0]);
  });

  it('writes members in the order of the manifest, not of the object', () => {
    expect(encoded([number('a'), number('b')], { b: 2, a: 1 }, [number('c')], { c: 3 })).toEqual([1, 2, 3]);
  });

  it('writes booleans, enums and choices as indices, a group without header', () => {
    const fields: Field[] = [
      { name: 'flag', type: 'boolean' },
      { name: 'word', type: 'enum', values: ['x', 'y', 'z'] },
      {
        name: 'choice',
        type: 'choice',
        kinds: [
          { kind: 'none', members: [] },
          { kind: 'some', members: [number('m')] },
        ],
      },
      { name: 'group', type: 'group', members: [number('g'), number('h')] },
    ];
    const values = { flag: true, word: 'z', choice: { kind: 'some', m: 7 }, group: { h: 2, g: 1 } };
    expect(encoded(fields, values)).toEqual([1, 2, 1, 7, 1, 2]);
    expect(encoded(fields, { ...values, choice: { kind: 'none' } })).toEqual([1, 2, 0, 1, 2]);
  });

  it('writes the four kinds of axis, both kinds of auto-number, and lists with their count', () => {
    const axis: Field = { name: 'k', type: 'axis', unit: '', min: -9, max: 9, maxCount: 9, wholeZone: true };
    expect(encoded([axis], { k: 3 })).toEqual([0, 3]);
    expect(encoded([axis], { k: { kind: 'range', start: -1, stop: 1, count: 5 } })).toEqual([1, -1, 1, 5]);
    expect(encoded([axis], { k: { kind: 'values', values: [4, 5] } })).toEqual([2, 2, 4, 5]);
    expect(encoded([axis], { k: { kind: 'whole-zone', count: 7 } })).toEqual([3, 7]);
    const auto: Field = { name: 's', type: 'auto-number', unit: '', min: 0, max: 9 };
    expect(encoded([auto], { s: { kind: 'auto' } })).toEqual([0]);
    expect(encoded([auto], { s: 2.5 })).toEqual([1, 2.5]);
    const list: Field = {
      name: 'l',
      type: 'list',
      minItems: 0,
      maxItems: 9,
      items: { type: 'group', members: [number('u')] },
    };
    expect(encoded([list], { l: [{ u: 1 }, { u: 2 }] })).toEqual([2, 1, 2]);
  });

  it('writes a table in place, at every place that names it', () => {
    const digest = 'a'.repeat(64);
    const column = (role: string, values: number[]) => ({ role, unit: '', values: new Float64Array(values) });
    const tables: Tables = new Map([[digest, { columns: [column('x', [1, 2, 3]), column('value', [4, 5, -0])] }]]);
    const field = (name: string): Field => ({
      name,
      type: 'table',
      columns: [
        { role: 'x', unit: '' },
        { role: 'value', unit: '' },
      ],
    });
    const once = [2, 3, 1, 2, 3, 4, 5, 0];
    expect(encoded([field('p'), field('q')], { p: digest, q: digest }, [], {}, tables)).toEqual([...once, ...once]);
    expect(() => encoded([field('p')], { p: digest })).toThrow('/parameters/p');
  });

  it('turns −0 into 0', () => {
    expect(Object.is(encoded([number('a')], { a: -0 })[0], 0)).toBe(true);
  });

  it.each([
    [{ a: Number.NaN }, '/parameters/a'],
    [{ a: Number.POSITIVE_INFINITY }, '/parameters/a'],
    [{ a: '1' }, '/parameters/a'],
    [{}, '/parameters/a'],
  ])('refuses %j with the place', (values, place) => {
    const attempt = () => encoded([number('a')], values);
    expect(attempt).toThrow(KernelRefusal);
    expect(attempt).toThrow(place);
  });

  it('refuses unknown models, kinds and enum values', () => {
    const word: Field = { name: 'word', type: 'enum', values: ['x'] };
    const choice: Field = { name: 'c', type: 'choice', kinds: [{ kind: 'none', members: [] }] };
    expect(() => encoded([word], { word: 'y' })).toThrow('/parameters/word');
    expect(() => encoded([choice], { c: { kind: 'other' } })).toThrow('/parameters/c/kind');
    expect(() => encodeSpecification(manifestOf([]), { model: 'third', parameters: {}, numerics: {} })).toThrow(
      'third',
    );
  });
});
