import { describe, expect, test } from 'vitest';
import type { KernelManifest, ModelManifest } from './definition.ts';
import { models } from './definitions/index.ts';
import type { Field } from './fields.ts';
import { parseSpecification } from './parse-specification.ts';

const manifest: KernelManifest = {
  interface: 1,
  version: '0.0.0',
  models: models as readonly ModelManifest[] as ModelManifest[],
};
const kernel = 'a'.repeat(64);
const landau = (parameters: object, rest: object = {}) =>
  parseSpecification(manifest, { model: 'landau-levels', parameters, kernel, ...rest });
const ribbon = (parameters: object, rest: object = {}) =>
  parseSpecification(manifest, { model: 'continuum-ribbon', parameters, kernel, ...rest });

function problemsOf(parsed: ReturnType<typeof parseSpecification>) {
  if (parsed.ok) throw new Error('was accepted');
  return parsed.problems;
}
function specificationOf(parsed: ReturnType<typeof parseSpecification>) {
  if (!parsed.ok) throw new Error(JSON.stringify(parsed.problems));
  return parsed.specification;
}

describe('refusals name field, value and limit', () => {
  test.each([
    ['an unknown parameter', ribbon({ fieldt: 3 }), '/parameters/fieldt', /nearest known name is fieldT/],
    [
      'an unknown member of a kind',
      ribbon({ width: { kind: 'dimer-lines', cout: 3 } }),
      '/parameters/width/cout',
      /count/,
    ],
    ['a member of another kind', ribbon({ width: { kind: 'nm', count: 3 } }), '/parameters/width/count', /widthNm/],
    ['an unknown kind', ribbon({ edge: { kind: 'zig-zag' } }), '/parameters/edge', /nearest known kind is zigzag/],
    ['a choice without kind', ribbon({ edge: { lowerSign: 1 } }), '/parameters/edge', /without its "kind"/],
    ['a number for a choice', ribbon({ width: 20 }), '/parameters/width', /is 20; it must be an object with "kind"/],
    ['an unknown enum value', ribbon({ valleys: 'Kprime' }), '/parameters/valleys', /nearest known value is K-prime/],
    [
      'a text with a unit',
      ribbon({ fieldT: '12 T' }),
      '/parameters/fieldT',
      /text “12 T”; it must be a bare number in T/,
    ],
    ['a value out of range', ribbon({ temperatureK: -1 }), '/parameters/temperatureK', /is -1; it must be 0 to 3000 K/],
    ['a length of 0', ribbon({ bondLengthNm: 0 }), '/parameters/bondLengthNm', /more than 0 and at most 10 nm/],
    ['NaN', ribbon({ fieldT: Number.NaN }), '/parameters/fieldT', /NaN, which is no finite number/],
    ['infinity', landau({ fieldT: Number.POSITIVE_INFINITY }), '/parameters/fieldT', /no finite number/],
    ['a fraction for an integer', landau({ levels: 2.5 }), '/parameters/levels', /is 2.5; it must be a whole number/],
    [
      'a range of 10⁹ points',
      landau({ fieldT: { kind: 'range', start: 0, stop: 1, count: 1e9 } }),
      '/parameters/fieldT/count',
      /fieldT asks for 1000000000 points; an axis holds at most 20001/,
    ],
    [
      'a range of one point',
      landau({ fieldT: { kind: 'range', start: 0, stop: 1, count: 1 } }),
      '/parameters/fieldT/count',
      /at least 2/,
    ],
    [
      'a range out of bounds',
      landau({ fieldT: { kind: 'range', start: 0, stop: 1001, count: 3 } }),
      '/parameters/fieldT/stop',
      /-1000 to 1000 T/,
    ],
    [
      'a range with a step',
      landau({ fieldT: { kind: 'range', start: 0, stop: 1, count: 3, step: 1 } }),
      '/parameters/fieldT/step',
      /known name is (start|stop)/,
    ],
    [
      'an empty list of values',
      landau({ fieldT: { kind: 'values', values: [] } }),
      '/parameters/fieldT/values',
      /has 0 items/,
    ],
    [
      'a bad value in a list',
      landau({ fieldT: { kind: 'values', values: [1, 'x'] } }),
      '/parameters/fieldT/values/1',
      /text “x”/,
    ],
    [
      'whole-zone where there is none',
      ribbon({ kPerNm: { kind: 'whole-zone', count: 3 } }),
      '/parameters/kPerNm',
      /range or values/,
    ],
    [
      'a table that is no digest',
      ribbon({ potentialEv: { kind: 'table', table: 'abc' } }),
      '/parameters/potentialEv/table',
      /64 hexadecimal/,
    ],
    ['a table left out', ribbon({ potentialEv: { kind: 'table' } }), '/parameters/potentialEv/table', /is missing/],
    ['parameters that are a list', ribbon([]), '/parameters', /must be an object/],
    ['null for numerics', ribbon({}, { numerics: null }), '/numerics', /must be an object/],
    ['an unknown model', ribbon({}, { model: 'landau-level' }), '/model', /nearest known model is landau-levels/],
    ['no kernel', ribbon({}, { kernel: undefined }), '/kernel', /digest/],
    ['another schema', ribbon({}, { schema: 'nightcone.job/2' }), '/schema', /nightcone.job\/2/],
    ['an unknown member', ribbon({}, { numeric: {} }), '/numeric', /nearest known name is numerics/],
    ['__proto__', ribbon(JSON.parse('{"__proto__":{"a":1}}')), '/parameters/__proto__', /unknown here/],
    ['null', parseSpecification(manifest, null), '', /must be a JSON object/],
  ])('%s', (_name, parsed, field, message) => {
    const problems = problemsOf(parsed);
    expect(problems.map((problem) => problem.field)).toContain(field);
    const problem = problems.find((candidate) => candidate.field === field);
    expect(problem?.message).toMatch(message);
    expect(problem?.limit.length).toBeGreaterThan(0);
  });

  test('all problems at once', () => {
    const problems = problemsOf(ribbon({ fieldT: 'x', valleys: 7, potental: 1 }, { numerics: { grid: {} } }));
    expect(problems.map(({ field }) => field).sort()).toEqual([
      '/numerics/grid',
      '/parameters/fieldT',
      '/parameters/potental',
      '/parameters/valleys',
    ]);
  });
});

describe('the completed specification', () => {
  test('holds every default, nested ones too', () => {
    const { parameters, numerics } = specificationOf(
      ribbon(
        { width: { kind: 'zigzag-chains' }, spectrum: { kind: 'window', eMax: 0.1 } },
        { numerics: { grid: { kind: 'single' } } },
      ),
    );
    expect(parameters.width).toEqual({ kind: 'zigzag-chains', count: 40, rule: 'matching' });
    expect(parameters.spectrum).toEqual({ kind: 'window', eMin: -0.3, eMax: 0.1 });
    expect(parameters.kPerNm).toEqual({ kind: 'range', start: -1, stop: 1, count: 201 });
    expect(parameters.edge).toEqual({ kind: 'armchair' });
    expect(numerics).toEqual({ grid: { kind: 'single', cells: 200 }, states: [] });
  });

  test('is a fixed point', () => {
    const once = specificationOf(landau({}));
    expect(specificationOf(parseSpecification(manifest, once))).toEqual(once);
  });

  test('has 0 for -0 everywhere', () => {
    const { parameters } = specificationOf(
      landau({
        temperatureK: -0,
        levels: -0,
        fieldT: { kind: 'values', values: [-0] },
        system: { kind: 'monolayer', massEv: -0 },
      }),
    );
    expect(Object.is(parameters.temperatureK, 0)).toBe(true);
    expect(Object.is(parameters.levels, 0)).toBe(true);
    expect(parameters).toMatchObject({ fieldT: { values: [0] }, system: { massEv: 0 } });
    expect(JSON.stringify(parameters)).not.toContain('-0,');
    expect(Object.is((parameters.fieldT as { values: number[] }).values[0], 0)).toBe(true);
  });

  test('a bare number, a range and values on an axis stay what they are', () => {
    expect(specificationOf(landau({ fieldT: 5 })).parameters.fieldT).toBe(5);
    expect(specificationOf(landau({ fieldT: { kind: 'values', values: [5] } })).parameters.fieldT).toEqual({
      kind: 'values',
      values: [5],
    });
  });

  test('lists distinct tables in order, whatever was sent', () => {
    const [a, b] = ['1'.repeat(64), '0'.repeat(64)];
    const { tables } = specificationOf(
      ribbon(
        {
          potentialEv: { kind: 'table', table: a },
          massEv: { kind: 'table', table: b },
          gaugePerNm: { kind: 'table', table: a },
        },
        { tables: ['f'.repeat(64)] },
      ),
    );
    expect(tables).toEqual([b, a]);
  });
});

test('types that no released model uses yet: auto-number, group, boolean, whole-zone, list of groups', () => {
  const parameters: Field[] = [
    { name: 'scaleEv', type: 'auto-number', unit: 'eV', min: 0, max: 9, default: { kind: 'auto' } },
    { name: 'span', type: 'group', members: [{ name: 'from', type: 'integer', min: -9, max: 9, default: -2 }] },
    { name: 'flag', type: 'boolean', default: false },
    {
      name: 'k',
      type: 'axis',
      unit: '1/nm',
      min: 0,
      max: 9,
      maxCount: 9,
      wholeZone: true,
      default: { kind: 'whole-zone', count: 5 },
    },
    {
      name: 'layers',
      type: 'list',
      minItems: 0,
      maxItems: 3,
      default: [{}],
      items: { type: 'group', members: [{ name: 'nm', type: 'number', unit: 'nm', min: 0, max: 5, default: 1 }] },
    },
  ];
  const other: KernelManifest = {
    ...manifest,
    models: [{ ...(models[0] as ModelManifest), id: 'other', parameters, numerics: [] }],
  };
  const parse = (given: object) => parseSpecification(other, { model: 'other', parameters: given, kernel });
  expect(specificationOf(parse({})).parameters).toEqual({
    scaleEv: { kind: 'auto' },
    span: { from: -2 },
    flag: false,
    k: { kind: 'whole-zone', count: 5 },
    layers: [{ nm: 1 }],
  });
  expect(specificationOf(parse({ scaleEv: 3 })).parameters.scaleEv).toBe(3);
  expect(problemsOf(parse({ scaleEv: { kind: 'aut' } }))[0]?.message).toMatch(
    /scaleEv is .*; it must be {"kind":"auto"}/,
  );
  expect(problemsOf(parse({ span: { form: 1 } }))[0]).toMatchObject({ field: '/parameters/span/form' });
  expect(problemsOf(parse({ layers: [{ nm: 6 }] }))[0]).toMatchObject({ field: '/parameters/layers/0/nm', value: 6 });
  expect(problemsOf(parse({ k: { kind: 'whole-zone', count: 10 } }))[0]?.message).toMatch(/at most 9/);
});

test('every default of every model fits its own definition', () => {
  for (const model of models) expect(parseSpecification(manifest, { model: model.id, kernel }).ok, model.id).toBe(true);
});
