import { z } from 'zod';

/** RFC 9457 problem details. `code` is stable; `errors` name field, value and limit. */
export const Problem = z.object({
  type: z.string(),
  title: z.string(),
  status: z.int(),
  code: z.string(),
  detail: z.string(),
  requestId: z.string().optional(),
  errors: z
    .array(
      z.object({
        /** JSON Pointer into the request body, or the name of a query parameter. */
        field: z.string(),
        message: z.string(),
        value: z.unknown().optional(),
        limit: z.string().optional(),
      }),
    )
    .optional(),
  /** Numbers a client may act on, e.g. of a quota refusal. */
  figures: z.record(z.string(), z.number()).optional(),
});
export type Problem = z.infer<typeof Problem>;

export const commonProblems = {
  'invalid-input': 400,
  'not-signed-in': 401,
  'account-waiting': 403,
  forbidden: 403,
  'cross-origin': 403,
  'not-found': 404,
  conflict: 409,
  'idempotency-mismatch': 409,
  'result-evicted': 409,
  'body-too-large': 413,
  'invalid-specification': 422,
  'validity-refused': 422,
  'too-many-points': 422,
  'unknown-kernel': 422,
  'quota-exceeded': 422,
  'too-many-requests': 429,
  internal: 500,
  unavailable: 503,
} as const;
export type ProblemCode = keyof typeof commonProblems;
