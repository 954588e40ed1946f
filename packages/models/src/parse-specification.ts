import type { z } from 'zod';
import { collectProblems } from './collect-problems.ts';
import { collectTables } from './collect-tables.ts';
import type { KernelManifest, ModelManifest, Specification } from './definition.ts';
import { explainUnknown, quoteValue, type SpecificationProblem } from './explain-problem.ts';
import { nearestName } from './nearest-name.ts';
import { digestPattern, parametersSchema } from './schema.ts';

export type { SpecificationProblem } from './explain-problem.ts';

export type ParsedSpecification =
  | { ok: true; specification: Specification }
  | { ok: false; problems: SpecificationProblem[] };

const members = ['schema', 'model', 'parameters', 'numerics', 'tables', 'kernel'];
const schemaName = 'nightcone.job/1';

/**
 * Checks a specification against a kernel's manifest and completes it: every default written out, `-0` mended,
 * `tables` rebuilt. `kernel` must be given: which kernel is meant is the caller's decision. No host arithmetic.
 *
 * @param input anything, as it came out of JSON.parse
 * @returns the complete specification, or every problem with its place, value and limit
 */
export function parseSpecification(manifest: KernelManifest, input: unknown): ParsedSpecification {
  if (!isObject(input)) return refused('', input, 'an object', 'The specification must be a JSON object.');
  const problems: SpecificationProblem[] = [];
  for (const name of Object.keys(input)) {
    if (!members.includes(name))
      problems.push({ field: `/${name}`, value: asJson(input[name]), ...explainUnknown(name, members) });
  }
  if (input.schema !== undefined && input.schema !== schemaName)
    problems.push(problem('/schema', input.schema, schemaName, `schema is ${quoteValue(input.schema)}.`));
  if (typeof input.kernel !== 'string' || !digestPattern.test(input.kernel))
    problems.push(
      problem(
        '/kernel',
        input.kernel,
        '64 hexadecimal digits',
        `kernel is ${quoteValue(input.kernel)}; it is a digest.`,
      ),
    );
  const model = manifest.models.find(({ id }) => id === input.model);
  if (model === undefined) return { ok: false, problems: [...problems, unknownModel(manifest, input.model)] };

  const parameters = parsePart(model, 'parameters', input.parameters, problems);
  const numerics = parsePart(model, 'numerics', input.numerics, problems);
  if (parameters === undefined || numerics === undefined || problems.length > 0) return { ok: false, problems };
  const specification = { schema: schemaName, model: model.id, parameters, numerics, kernel: input.kernel as string };
  return {
    ok: true,
    specification: { ...specification, tables: collectTables(model, specification) } as Specification,
  };
}

/** Parses `parameters` or `numerics` alone; adds what is wrong to `problems`. */
function parsePart(
  model: ModelManifest,
  part: 'parameters' | 'numerics',
  input: unknown = {},
  problems: SpecificationProblem[],
): Specification['parameters'] | undefined {
  const parsed = partSchema(model, part).safeParse(input);
  if (parsed.success) return parsed.data as Specification['parameters'];
  problems.push(...collectProblems(parsed.error.issues, model[part], input, part));
  return undefined;
}

const schemas = new WeakMap<ModelManifest, Partial<Record<'parameters' | 'numerics', z.ZodObject>>>();

function partSchema(model: ModelManifest, part: 'parameters' | 'numerics'): z.ZodObject {
  const known = schemas.get(model) ?? {};
  schemas.set(model, known);
  known[part] ??= parametersSchema(model[part]);
  return known[part];
}

function unknownModel(manifest: KernelManifest, value: unknown): SpecificationProblem {
  const ids = manifest.models.map(({ id }) => id);
  const nearest = typeof value === 'string' ? `; the nearest known model is ${nearestName(value, ids)}` : '';
  return problem('/model', value, `one of ${ids.join(', ')}`, `model is ${quoteValue(value)}${nearest}.`);
}

const isObject = (value: unknown): value is Record<string, unknown> =>
  typeof value === 'object' && value !== null && !Array.isArray(value);

const asJson = (value: unknown) => value as SpecificationProblem['value'];

const problem = (field: string, value: unknown, limit: string, message: string): SpecificationProblem => ({
  field,
  message,
  value: asJson(value),
  limit,
});

const refused = (...parts: Parameters<typeof problem>): ParsedSpecification => ({
  ok: false,
  problems: [problem(...parts)],
});
