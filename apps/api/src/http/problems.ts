import { commonProblems, type Problem, type ProblemCode } from '@nightcone/contracts';
import type { z } from 'zod';
import type { FieldError, Refusal } from '../refusal.ts';

const titles: Record<ProblemCode, string> = {
  'invalid-input': 'The request cannot be read',
  'not-signed-in': 'Not signed in',
  'account-waiting': 'This account waits to be admitted',
  forbidden: 'Not permitted',
  'cross-origin': 'Request from another site',
  'not-found': 'Not found',
  conflict: 'Something else changed it first',
  'idempotency-mismatch': 'Same key, other request',
  'result-evicted': 'The arrays are not kept',
  'body-too-large': 'The request is too large',
  'invalid-specification': 'The specification is not valid',
  'validity-refused': 'Outside the model’s range of validity',
  'too-many-points': 'Too many points',
  'unknown-kernel': 'Unknown kernel',
  'quota-exceeded': 'The quota does not suffice',
  'too-many-requests': 'Too many requests',
  internal: 'Something went wrong here',
  unavailable: 'Not available now',
};

export function problemDocument(refusal: Refusal, requestId: string): Problem {
  return {
    type: `urn:nightcone:problem:${refusal.code}`,
    title: titles[refusal.code],
    status: commonProblems[refusal.code],
    code: refusal.code,
    detail: refusal.message,
    requestId,
    ...refusal.more,
  };
}

type Path = readonly PropertyKey[];
const escapePointer = (key: PropertyKey) => String(key).replaceAll('~', '~0').replaceAll('/', '~1');
export const pointer = (path: Path) => path.map((key) => `/${escapePointer(key)}`).join('');

/** Long or deep values are not sent back; a message is for reading. */
function shown(value: unknown): unknown {
  if (typeof value === 'number' || typeof value === 'boolean' || value === null) return value;
  if (typeof value === 'string') return value.length > 100 ? `${value.slice(0, 100)}…` : value;
  return undefined;
}
const at = (root: unknown, path: Path): unknown =>
  path.reduce<unknown>((value, key) => (value as Record<PropertyKey, unknown> | undefined)?.[key], root);

function limitOf(issue: z.core.$ZodIssue): string | undefined {
  if (issue.code === 'too_big') return `at most ${issue.maximum}`;
  if (issue.code === 'too_small') return `at least ${issue.minimum}`;
  if (issue.code === 'invalid_value') return `one of ${issue.values.map(String).join(', ')}`;
  return undefined;
}

/** One entry per field: JSON Pointers for a body, plain names for query and path parameters. */
export function fieldErrors(error: z.ZodError, root: unknown, part: 'body' | 'query' | 'params'): FieldError[] {
  const name = (path: Path) => (part === 'body' ? pointer(path) : path.map(String).join('.'));
  return error.issues.flatMap((issue): FieldError[] => {
    if (issue.code === 'unrecognized_keys')
      return issue.keys.map((key) => ({
        field: name([...issue.path, key]),
        message: 'This member is not known here.',
      }));
    const value = shown(at(root, issue.path));
    const limit = limitOf(issue);
    return [
      {
        field: name(issue.path),
        message: issue.message,
        ...(value === undefined ? {} : { value }),
        ...(limit === undefined ? {} : { limit }),
      },
    ];
  });
}
