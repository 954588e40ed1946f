import type { Request, RequestHandler } from 'express';
import { ipKeyGenerator, rateLimit } from 'express-rate-limit';
import { Refusal } from '../refusal.ts';
import { callerOf } from './caller.ts';

const keyOf = (req: Request) => callerOf(req)?.account.id ?? ipKeyGenerator(req.ip ?? '');

/** Requests per minute, counted by account, or by address while nobody is signed in. */
export function perMinute(limit: number, what: string): RequestHandler {
  return rateLimit({
    windowMs: 60_000,
    limit,
    standardHeaders: 'draft-8',
    legacyHeaders: false,
    identifier: what.replaceAll(' ', '-'),
    keyGenerator: keyOf,
    handler: (_req, _res, next) =>
      next(new Refusal('too-many-requests', `More than ${limit} ${what} in a minute. Wait a little and try again.`)),
  });
}
