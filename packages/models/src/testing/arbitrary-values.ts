import fc from 'fast-check';
import type { Field, FieldType, Json } from '../fields.ts';

/** Any value that a type accepts, with defaults sometimes left out. Tables are left to tests that have some. */
export function arbitraryValue(type: FieldType): fc.Arbitrary<Json> {
  switch (type.type) {
    case 'number':
      return numberIn(type);
    case 'integer':
      return fc.integer({ min: type.min, max: type.max });
    case 'boolean':
      return fc.boolean();
    case 'enum':
      return fc.constantFrom(...type.values);
    case 'choice': {
      const kinds = type.kinds.filter(({ members }) => members.every((member) => member.type !== 'table'));
      return fc.oneof(
        ...kinds.map(({ kind, members }) => arbitraryMembers(members).map((rest) => ({ kind, ...rest }))),
      );
    }
    case 'axis': {
      const number = numberIn(type);
      const count = fc.integer({ min: 2, max: type.maxCount });
      const values = fc.array(number, { minLength: 1, maxLength: 6 });
      const kinds: fc.Arbitrary<Json>[] = [
        number,
        fc.record({ kind: fc.constant('range'), start: number, stop: number, count }),
        values.map((list) => ({ kind: 'values', values: list })),
      ];
      if (type.wholeZone) kinds.push(count.map((n) => ({ kind: 'whole-zone', count: n })));
      return fc.oneof(...kinds);
    }
    case 'auto-number':
      return fc.oneof(fc.constant({ kind: 'auto' }), numberIn(type));
    case 'group':
      return arbitraryMembers(type.members);
    case 'list':
      return fc.array(arbitraryValue(type.items), { minLength: type.minItems, maxLength: Math.min(type.maxItems, 6) });
    case 'table':
      throw new RangeError('no table at hand');
  }
}

/** Members of an object; those with a default may be absent. */
export function arbitraryMembers(fields: readonly Field[]): fc.Arbitrary<{ [name: string]: Json }> {
  const requiredKeys = fields.filter((field) => field.default === undefined).map(({ name }) => name);
  const model = Object.fromEntries(fields.map((field) => [field.name, arbitraryValue(field)]));
  return fc.record(model, { requiredKeys }) as fc.Arbitrary<{ [name: string]: Json }>;
}

/** No magnitudes below 10⁻⁹ but 0 and -0: nobody means them, and quotients of them leave the doubles. */
const numberIn = ({ min, max, exclusiveMin = false }: { min: number; max: number; exclusiveMin?: boolean }) =>
  fc
    .double({ min, max, minExcluded: exclusiveMin, noNaN: true, noDefaultInfinity: true })
    .map((value) => (Math.abs(value) >= 1e-9 ? value : exclusiveMin ? 1e-9 : value * 0));
