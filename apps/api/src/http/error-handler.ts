import type { ProblemCode } from '@nightcone/contracts';
import type { ErrorRequestHandler } from 'express';
import { Refusal } from '../refusal.ts';
import { problemDocument } from './problems.ts';

/** What the body parser throws, in our words. */
const bodyErrors: Record<string, [ProblemCode, string]> = {
  'entity.too.large': ['body-too-large', 'The body is larger than 1 MiB; send long lists as ranges.'],
  'entity.parse.failed': [
    'invalid-input',
    'The body is not JSON (numbers such as NaN and Infinity do not exist in it).',
  ],
  'encoding.unsupported': ['invalid-input', 'The content encoding is not supported.'],
  'charset.unsupported': ['invalid-input', 'The body must be UTF-8.'],
  'request.aborted': ['invalid-input', 'The request ended before its body was complete.'],
  'request.size.invalid': ['invalid-input', 'The body has another length than announced.'],
};

export function toRefusal(error: unknown): Refusal {
  if (error instanceof Refusal) return error;
  const known = bodyErrors[(error as { type?: string } | undefined)?.type ?? ''];
  if (known) return new Refusal(...known);
  const status = (error as { status?: number } | undefined)?.status;
  // e.g. a percent sign in the path that is no escape
  if (status === 400) return new Refusal('invalid-input', 'The address or the headers cannot be read.');
  if (status === 404) return new Refusal('not-found', 'There is nothing at this address.');
  return new Refusal(
    'internal',
    'The request failed here. Its number is in this answer; what was stored before is kept.',
  );
}

/** The only place where an error becomes an answer. Unknown errors are logged and never leak. */
export const sendProblem: ErrorRequestHandler = (error, req, res, next) => {
  const refusal = toRefusal(error);
  if (refusal.code === 'internal') req.log?.error({ err: error }, 'request failed');
  if (res.headersSent) return next(error);
  const problem = problemDocument(refusal, String(req.id));
  res.status(problem.status).type('application/problem+json').set('cache-control', 'no-store');
  if (refusal.code === 'not-signed-in') res.set('www-authenticate', 'Bearer');
  res.send(JSON.stringify(problem));
};
