import { describe, expect, test } from 'vitest';
import type { Specification, SweepAxis } from './definition.ts';
import { models } from './definitions/index.ts';
import { manifestOf } from './manifest.ts';
import { parseSpecification } from './parse-specification.ts';
import { parseRange } from './quantity.ts';
import { planSweep } from './sweep-plan.ts';
import { countSweepPoints, rangeAxis, sweepAxisProblems, sweepValues } from './sweep-points.ts';

const manifest = manifestOf(models, '0.0.0');
const ribbon = manifest.models.find(({ id }) => id === 'continuum-ribbon');
if (!ribbon) throw new Error('no ribbon');

function complete(input: object): Specification {
  const parsed = parseSpecification(manifest, { model: 'continuum-ribbon', kernel: '0'.repeat(64), ...input });
  if (!parsed.ok) throw new Error(JSON.stringify(parsed.problems));
  return parsed.specification;
}
const base = complete({});
const axis = (pointer: string, ...values: SweepAxis['values'][number]): SweepAxis => ({
  pointers: [pointer],
  values: values.map((value) => [value]),
});

test('points are row-major, the last axis runs fastest, zipped pointers vary together', () => {
  const axes: SweepAxis[] = [
    axis('/fieldT', 1, 2),
    {
      pointers: ['/width/count', '/valleys'],
      values: [
        [10, 'K'],
        [11, 'both'],
        [12, 'K-prime'],
      ],
    },
  ];
  expect(countSweepPoints(axes)).toBe(6);
  expect([0, 1, 2, 3, 4, 5].map((i) => sweepValues(axes, i))).toEqual([
    [1, 10, 'K'],
    [1, 11, 'both'],
    [1, 12, 'K-prime'],
    [2, 10, 'K'],
    [2, 11, 'both'],
    [2, 12, 'K-prime'],
  ]);
});

describe('a point', () => {
  test('equals the specification that says the same by itself', () => {
    const axes = [
      axis('/width', { kind: 'dimer-lines' }, { kind: 'nm', widthNm: 5 }),
      axis('/grid/cells', 100, 200),
      axis('/potentialEv', { kind: 'none' }, { kind: 'polynomial', coefficients: [0, 1] }),
    ];
    const plan = planSweep(manifest, base, axes);
    expect(plan.count).toBe(8);
    for (let i = 0; i < plan.count; i++) {
      const [width, cells, potentialEv] = sweepValues(axes, i);
      const alone = complete({
        parameters: { width, potentialEv },
        numerics: { grid: { kind: 'extrapolated', cells } },
      });
      expect(plan.point(i)).toEqual({ ok: true, specification: alone });
    }
    expect(base).toEqual(complete({}));
  });

  test('may set a whole choice and then a member of it', () => {
    const axes: SweepAxis[] = [
      {
        pointers: ['/potentialEv', '/potentialEv/coefficients/1'],
        values: [[{ kind: 'polynomial', coefficients: [0, 0] }, 0.25]],
      },
    ];
    expect(planSweep(manifest, base, axes).point(0)).toMatchObject({
      ok: true,
      specification: { parameters: { potentialEv: { coefficients: [0, 0.25] } } },
    });
  });

  test('rebuilds its tables', () => {
    const [a, b] = ['a'.repeat(64), 'b'.repeat(64)];
    const withTable = complete({ parameters: { massEv: { kind: 'table', table: b } } });
    const plan = planSweep(manifest, withTable, [axis('/massEv/table', a, b)]);
    expect(plan.point(0)).toMatchObject({ specification: { tables: [a] } });
  });

  test('that is wrong is told with its place; the others stand', () => {
    const plan = planSweep(manifest, base, [axis('/width/count', 10, 1, 'x')]);
    expect(plan.point(0).ok).toBe(true);
    expect(plan.point(1)).toMatchObject({ ok: false, problems: [{ field: '/parameters/width/count', value: 1 }] });
    expect(plan.point(2)).toMatchObject({ ok: false, problems: [{ value: 'x' }] });
    const member = planSweep(manifest, base, [axis('/potentialEv/coefficients/3', 1)]);
    expect(member.point(0)).toMatchObject({
      ok: false,
      problems: [{ field: '/parameters/potentialEv/coefficients/3' }],
    });
  });
});

test('wrong axes are told in words', () => {
  const axes: SweepAxis[] = [
    { pointers: ['/widht/count', 'fieldT'], values: [[1, 2]] },
    { pointers: ['/fieldT'], values: [] },
    { pointers: ['/fieldT'], values: [[1, 2]] },
  ];
  expect(sweepAxisProblems(ribbon, axes).map(({ field }) => field)).toEqual([
    '/0/pointers/0',
    '/0/pointers/1',
    '/1/values',
    '/2/pointers/0',
    '/2/values/0',
  ]);
  expect(() => planSweep(manifest, base, axes)).toThrow(/nothing at \/widht\/count/);
});

test('a range axis holds the doubles of its decimals', () => {
  const range = parseRange('10..69 / 60', '', 100);
  if (!range.ok) throw new Error(range.message);
  const { values } = rangeAxis('/width/count', range.value);
  expect(values.length).toBe(60);
  expect([values[0], values[59]]).toEqual([[10], [69]]);
});

test('no name stands both in parameters and in numerics: a pointer means one place', () => {
  for (const model of manifest.models) {
    const names = [...model.parameters, ...model.numerics].map(({ name }) => name);
    expect(new Set(names).size, model.id).toBe(names.length);
  }
});
