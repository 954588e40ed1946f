import { describe, expect, test } from 'vitest';
import { models } from './definitions/index.ts';
import type { Field } from './fields.ts';
import { modelJsonSchema, parametersSchema } from './schema.ts';

type JsonSchema = { [key: string]: JsonSchema } & { default?: unknown; required?: string[]; enum?: string[] };

describe('the JSON Schema of a model', () => {
  test.each(models.map((model) => [model.id, model] as const))(
    '%s states every field with its default',
    (_id, model) => {
      const schema = modelJsonSchema(model) as JsonSchema;
      for (const part of ['parameters', 'numerics'] as const) {
        const described = schema.properties?.[part]?.properties ?? {};
        expect(Object.keys(described)).toEqual(model[part].map(({ name }) => name));
        for (const { name, default: fallback } of model[part]) expect(described[name]?.default, name).toEqual(fallback);
        expect(schema.properties?.[part]?.additionalProperties).toBe(false);
      }
      expect(schema.required).toEqual(['model']);
    },
  );

  test('carries ranges, exclusive ends and enum values', () => {
    const parameters: Field[] = [
      { name: 'lengthNm', type: 'number', unit: 'nm', min: 0, exclusiveMin: true, max: 5, default: 1 },
      { name: 'count', type: 'integer', min: 2, max: 9, default: 3 },
      { name: 'rule', type: 'enum', values: ['a', 'b'], default: 'a' },
      { name: 'table', type: 'table', columns: [{ role: 'x', unit: 'nm' }] },
    ];
    const schema = modelJsonSchema({ id: 'm', parameters, numerics: [] }) as JsonSchema;
    const described = schema.properties?.parameters?.properties ?? {};
    expect(described.lengthNm).toMatchObject({ type: 'number', exclusiveMinimum: 0, maximum: 5 });
    expect(described.count).toMatchObject({ type: 'integer', minimum: 2, maximum: 9 });
    expect(described.rule).toMatchObject({ enum: ['a', 'b'] });
    expect(schema.properties?.parameters?.required).toEqual(['table']);
  });
});

test('a default that does not fit its own field is found', () => {
  const wrong: Field[] = [{ name: 'count', type: 'integer', min: 2, max: 9, default: 1 }];
  expect(parametersSchema(wrong).safeParse({}).success).toBe(false);
});
