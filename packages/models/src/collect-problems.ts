import type { z } from 'zod';
import {
  allowedText,
  explainCount,
  explainMisfit,
  explainUnknown,
  quoteValue,
  type SpecificationProblem,
} from './explain-problem.ts';
import { chosenMembers, typeAt } from './field-at.ts';
import type { Field, FieldType } from './fields.ts';
import { getTokens, pointerOf } from './pointer.ts';

type Issue = z.core.$ZodIssue;
type Path = (string | number)[];

/** Turns the issues of `parametersSchema(fields)` on `input` into sentences. `part` is 'parameters' or 'numerics'. */
export function collectProblems(
  issues: readonly Issue[],
  fields: readonly Field[],
  input: unknown,
  part: string,
): SpecificationProblem[] {
  return issues.flatMap((issue) => explainIssue(issue, issue.path as Path, fields, input, part));
}

function explainIssue(
  issue: Issue,
  issuePath: Path,
  fields: readonly Field[],
  input: unknown,
  part: string,
): SpecificationProblem[] {
  // a kind that does not fit is a misfit of the whole choice or axis
  const path = issuePath.at(-1) === 'kind' ? issuePath.slice(0, -1) : issuePath;
  const value = getTokens(input, path);
  const field = pointerOf([part, ...path]);
  const type = typeAt(fields, input, path);
  if (issue.code === 'unrecognized_keys') {
    const known = knownNames(fields, input, path, type);
    return issue.keys.map((key) => ({
      field: pointerOf([part, ...path, key]),
      value: getTokens(input, [...path, key]),
      ...explainUnknown(key, known),
    }));
  }
  if (issue.code === 'invalid_union' && typeof value === 'object' && value !== null && !Array.isArray(value)) {
    // an axis or auto-number given as an object: the issues of the object branch say more
    const branch = issue.errors.find((errors) => errors.some((error) => error.path.length > 0 || isUnknownKey(error)));
    if (branch)
      return branch.flatMap((inner) => explainIssue(inner, [...path, ...(inner.path as Path)], fields, input, part));
  }
  const name = String(path.at(-1) ?? part);
  if (type === undefined) {
    const limit = path.length === 0 ? 'an object' : `in ${pointerOf([part, ...path.slice(0, -1)])}`;
    return [{ field, value, limit, message: `${name} is ${quoteValue(value)}; it must be ${limit}.` }];
  }
  const owner = typeAt(fields, input, path.slice(0, -1));
  const message =
    name === 'count' && owner?.type === 'axis' && typeof value === 'number'
      ? explainCount(String(path.at(-2)), value, owner.maxCount)
      : explainMisfit(name, type, value);
  return [{ field, value, limit: allowedText(type), message }];
}

const isUnknownKey = (issue: Issue) => issue.code === 'unrecognized_keys';

function knownNames(fields: readonly Field[], input: unknown, path: Path, type: FieldType | undefined): string[] {
  if (path.length === 0) return fields.map(({ name }) => name);
  if (type?.type === 'choice') return chosenMembers(type, getTokens(input, path)).map(({ name }) => name);
  if (type?.type === 'group') return type.members.map(({ name }) => name);
  if (type?.type !== 'axis') return [];
  const kind = getTokens(input, [...path, 'kind']);
  return kind === 'range' ? ['start', 'stop', 'count'] : kind === 'values' ? ['values'] : ['count'];
}
