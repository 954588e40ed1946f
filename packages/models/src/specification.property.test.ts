import { encodeSpecification } from '@nightcone/kernel';
import fc from 'fast-check';
import { describe, expect, test } from 'vitest';
import { models } from './definitions/index.ts';
import { evaluateExpression } from './evaluate-expression.ts';
import { manifestOf } from './manifest.ts';
import { parseSpecification } from './parse-specification.ts';
import { arbitraryMembers } from './testing/arbitrary-values.ts';
import { titleOf } from './title-of.ts';
import { validityOf } from './validity.ts';

const manifest = manifestOf(models, '0.0.0');
const kernel = '0'.repeat(64);

function numbersOf(value: unknown): number[] {
  if (typeof value === 'number') return [value];
  return typeof value === 'object' && value !== null ? Object.values(value).flatMap(numbersOf) : [];
}

describe.each(models.map((model) => [model.id, model] as const))('whatever %s accepts', (_id, model) => {
  const bodies = fc.record({
    parameters: arbitraryMembers(model.parameters),
    numerics: arbitraryMembers(model.numerics),
  });

  test('is completed to a fixed point that the kernel’s record takes', () => {
    fc.assert(
      fc.property(bodies, (body) => {
        const parsed = parseSpecification(manifest, { model: model.id, kernel, ...body });
        if (!parsed.ok) throw new Error(JSON.stringify(parsed.problems));
        const { specification } = parsed;
        expect(parseSpecification(manifest, specification)).toEqual(parsed);
        expect(numbersOf(specification).filter((number) => Object.is(number, -0))).toEqual([]);
        expect(encodeSpecification(manifest, specification).length % 8).toBe(0);
      }),
      { numRuns: 60 },
    );
  });

  test('has a title, notes and an estimate', () => {
    fc.assert(
      fc.property(bodies, (body) => {
        const parsed = parseSpecification(manifest, { model: model.id, kernel, ...body });
        if (!parsed.ok) return false;
        const { specification } = parsed;
        const formulas = [
          model.sliceCount,
          model.cost,
          model.assembleCost,
          model.sliceBytes,
          model.assembleBytes,
          model.resultBytes,
        ];
        for (const formula of formulas) {
          const value = evaluateExpression(formula, model, specification);
          expect(Number.isFinite(value) && value > 0, JSON.stringify(formula)).toBe(true);
        }
        for (const { text, value, limit } of validityOf(model, specification))
          expect(text.length > 0 && Number.isFinite(value) && Number.isFinite(limit), text).toBe(true);
        return titleOf(model, specification).startsWith(model.title);
      }),
      { numRuns: 60 },
    );
  });
});

test('whatever else is sent is refused in words and never throws', () => {
  const anything = fc.oneof(
    fc.jsonValue(),
    fc.dictionary(fc.constantFrom('fieldT', 'kPerNm', 'edge', 'kind'), fc.jsonValue()),
  );
  const input = fc.record({
    model: fc.constantFrom(...models.map(({ id }) => id), 'x', null),
    parameters: anything,
    numerics: anything,
  });
  fc.assert(
    fc.property(fc.oneof(input, fc.jsonValue()), (sent) => {
      const parsed = parseSpecification(manifest, sent);
      return (
        !parsed.ok &&
        parsed.problems.length > 0 &&
        parsed.problems.every(({ message, limit }) => message !== '' && limit !== '')
      );
    }),
    { numRuns: 300 },
  );
});
