import type { z } from 'zod';
import { collectProblems } from './collect-problems.ts';
import { collectTables } from './collect-tables.ts';
import type { KernelManifest, Specification, SweepAxis } from './definition.ts';
import type { SpecificationProblem } from './explain-problem.ts';
import type { Field } from './fields.ts';
import type { ParsedSpecification } from './parse-specification.ts';
import { pointerTokens, setPointer } from './pointer.ts';
import { fieldSchema } from './schema.ts';
import { countSweepPoints, partOf, sweepValues } from './sweep-points.ts';

type Part = 'parameters' | 'numerics';

/** The points of a sweep, each made when asked for. */
export interface SweepPlan {
  count: number;
  /** Complete specification of point `index`, or what is wrong with it. */
  point(index: number): ParsedSpecification;
}

/**
 * Plans a sweep over a complete base specification: points are row-major, the last axis runs fastest, pointers are set
 * in the order of the axes (a whole choice first, then a member of it). Only the swept fields of a point are parsed
 * again. Throws RangeError where `sweepAxisProblems` has something to say about a pointer.
 */
export function planSweep(manifest: KernelManifest, base: Specification, axes: readonly SweepAxis[]): SweepPlan {
  const model = manifest.models.find(({ id }) => id === base.model);
  if (model === undefined) throw new RangeError(`the kernel has no model ${base.model}`);
  const targets = axes.flatMap((axis) => axis.pointers).map((pointer) => target(model, pointer));
  const swept = [...new Map(targets.map((each) => [`${each.part}/${each.field.name}`, each])).values()];

  const point = (index: number): ParsedSpecification => {
    const values = sweepValues(axes, index);
    const body: Pick<Specification, Part> = { parameters: base.parameters, numerics: base.numerics };
    for (const [i, { part, pointer }] of targets.entries()) {
      try {
        body[part] = setPointer(body[part], pointer, values[i] ?? null);
      } catch (error) {
        return { ok: false, problems: [unreachable(part, pointer, values[i], (error as Error).message)] };
      }
    }
    const problems: SpecificationProblem[] = [];
    for (const { part, field, schema } of swept) {
      const parsed = schema.safeParse(body[part][field.name]);
      if (parsed.success) body[part] = { ...body[part], [field.name]: parsed.data as Specification[Part][string] };
      else problems.push(...collectProblems(issuesBelow(parsed.error, field), model[part], body[part], part));
    }
    if (problems.length > 0) return { ok: false, problems };
    return { ok: true, specification: { ...base, ...body, tables: collectTables(model, body) } };
  };
  return { count: countSweepPoints(axes), point };
}

function target(model: Record<Part, Field[]>, pointer: string) {
  const part = partOf(model, pointer);
  const name = part && pointerTokens(pointer)[0];
  const field = part && model[part].find((candidate) => candidate.name === name);
  if (part === undefined || field === undefined) throw new RangeError(`the model has nothing at ${pointer}`);
  return { part, pointer, field, schema: fieldSchema(field) };
}

const issuesBelow = (error: z.ZodError, field: Field) =>
  error.issues.map((issue) => ({ ...issue, path: [field.name, ...issue.path] }));

const unreachable = (part: Part, pointer: string, value: SpecificationProblem['value'], message: string) => ({
  field: `/${part}${pointer}`,
  message,
  value,
  limit: 'a place that exists in the base specification',
});
