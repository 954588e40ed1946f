import type { SweepAxis } from './definition.ts';
import { pathExists } from './field-at.ts';
import type { Field, Json } from './fields.ts';
import { pointerTokens } from './pointer.ts';
import { type DecimalRange, rangeValues } from './quantity.ts';

/** Number of points of a sweep, without making any; 1 for no axes. */
export function countSweepPoints(axes: readonly { values: readonly unknown[] }[]): number {
  return axes.reduce((count, { values }) => count * values.length, 1);
}

/** An axis whose values are a decimal range. */
export function rangeAxis(pointer: string, range: DecimalRange): SweepAxis {
  return { pointers: [pointer], values: rangeValues(range).map((value) => [value]) };
}

/** What is wrong with the axes of a sweep over this model, in words, by the place in the list of axes. */
export function sweepAxisProblems(
  model: { parameters: Field[]; numerics: Field[] },
  axes: readonly SweepAxis[],
): { field: string; message: string; value: Json; limit: string }[] {
  const problems: ReturnType<typeof sweepAxisProblems> = [];
  const seen = new Set<string>();
  for (const [index, axis] of axes.entries()) {
    for (const [place, pointer] of axis.pointers.entries()) {
      const field = `/${index}/pointers/${place}`;
      const say = (message: string, limit: string) => problems.push({ field, message, value: pointer, limit });
      if (partOf(model, pointer) === undefined)
        say(`The model has nothing at ${pointer}.`, 'a JSON Pointer into parameters or numerics');
      if (seen.has(pointer)) say(`${pointer} is varied twice.`, 'each place on one axis only');
      seen.add(pointer);
    }
    const field = `/${index}/values`;
    if (axis.values.length === 0)
      problems.push({ field, message: 'The axis has no values.', value: [], limit: '1 or more' });
    for (const [i, values] of axis.values.entries()) {
      if (values.length === axis.pointers.length) continue;
      const limit = `${axis.pointers.length}, one for each pointer`;
      problems.push({
        field: `${field}/${i}`,
        message: `Value ${i} has ${values.length} entries.`,
        value: values,
        limit,
      });
    }
  }
  return problems;
}

/** Where a swept pointer leads: `parameters` before `numerics`; undefined where the model cannot have such a place. */
export function partOf(
  model: { parameters: Field[]; numerics: Field[] },
  pointer: string,
): 'parameters' | 'numerics' | undefined {
  let tokens: string[];
  try {
    tokens = pointerTokens(pointer);
  } catch {
    return undefined;
  }
  if (pathExists(model.parameters, tokens)) return 'parameters';
  return pathExists(model.numerics, tokens) ? 'numerics' : undefined;
}

/** One value for every pointer of every axis at a point; row-major, the last axis runs fastest. */
export function sweepValues(axes: readonly SweepAxis[], index: number): Json[] {
  const values: Json[] = [];
  let rest = index;
  for (const axis of [...axes].reverse()) {
    const place = rest % axis.values.length;
    values.unshift(...(axis.values[place] ?? []));
    rest = (rest - place) / axis.values.length;
  }
  return values;
}
