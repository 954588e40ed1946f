import { z } from 'zod';
import type { Field, FieldType, Json } from './fields.ts';

// No generated code: a content-security policy without 'unsafe-eval' stays quiet, and no host Math is touched.
z.config({ jitless: true });

/** SHA-256 in lower-case hexadecimal. */
export const digestPattern = /^[0-9a-f]{64}$/;

/** `-0` is the same job as `0`. */
const positiveZero = (value: number) => (value === 0 ? 0 : value);

function numberSchema(type: { min: number; max: number; exclusiveMin?: boolean }): z.ZodNumber {
  const finite = z.number().max(type.max).overwrite(positiveZero);
  return type.exclusiveMin ? finite.gt(type.min) : finite.min(type.min);
}

/** IEEE doubles with |n| ≤ 2⁵³ − 1. */
const integerSchema = (min: number, max: number) => z.int().min(min).max(max).overwrite(positiveZero);

function axisSchema(type: Extract<FieldType, { type: 'axis' }>): z.ZodType {
  const number = numberSchema(type);
  const count = integerSchema(2, type.maxCount);
  const range = z.strictObject({ kind: z.literal('range'), start: number, stop: number, count });
  const values = z.strictObject({ kind: z.literal('values'), values: z.array(number).min(1).max(type.maxCount) });
  const wholeZone = z.strictObject({ kind: z.literal('whole-zone'), count });
  return z.union([
    number,
    type.wholeZone
      ? z.discriminatedUnion('kind', [range, values, wholeZone])
      : z.discriminatedUnion('kind', [range, values]),
  ]);
}

/** Schema of a value of this type: strict, in range, `-0` mended. */
export function typeSchema(type: FieldType): z.ZodType {
  switch (type.type) {
    case 'number':
      return numberSchema(type);
    case 'integer':
      return integerSchema(type.min, type.max);
    case 'boolean':
      return z.boolean();
    case 'enum':
      return z.enum(type.values);
    case 'choice': {
      const kinds = type.kinds.map(({ kind, members }) =>
        z.strictObject({ kind: z.literal(kind), ...memberShape(members) }),
      );
      return z.discriminatedUnion('kind', kinds as unknown as [z.ZodObject, ...z.ZodObject[]]);
    }
    case 'axis':
      return axisSchema(type);
    case 'auto-number':
      return z.union([numberSchema(type), z.strictObject({ kind: z.literal('auto') })]);
    case 'group':
      return z.strictObject(memberShape(type.members));
    case 'list':
      return z.array(typeSchema(type.items)).min(type.minItems).max(type.maxItems);
    case 'table':
      return z.string().regex(digestPattern);
  }
}

/** Schema of a field: its type, and its default (itself checked and completed) where it is absent. */
export function fieldSchema(field: Field): z.ZodType {
  const fallback = defaultOf(field);
  const schema = typeSchema(field);
  return fallback === undefined ? schema : schema.prefault(fallback);
}

function defaultOf(field: Field): Json | undefined {
  return field.default === undefined && field.type === 'group' ? {} : field.default;
}

function memberShape(fields: readonly Field[]): Record<string, z.ZodType> {
  return Object.fromEntries(fields.map((field) => [field.name, fieldSchema(field)]));
}

/**
 * Schema of an object with these fields: unknown names refused, every default written out (nested ones too).
 * Input may leave defaults out; output is complete.
 */
export function parametersSchema(fields: readonly Field[]): z.ZodObject {
  return z.strictObject(memberShape(fields));
}

/** JSON Schema (2020-12) of what may be sent for a model: `{ parameters, numerics }` with the defaults stated. */
export function modelJsonSchema(model: { id: string; parameters: Field[]; numerics: Field[] }): object {
  const body = z.strictObject({
    model: z.literal(model.id),
    parameters: parametersSchema(model.parameters).prefault({}),
    numerics: parametersSchema(model.numerics).prefault({}),
  });
  return z.toJSONSchema(body, { io: 'input' });
}
