import type { RequestHandler } from 'express';
import { Refusal } from '../refusal.ts';

const safe = new Set(['GET', 'HEAD', 'OPTIONS']);

/**
 * Refuses writes that another site makes a browser send. The browser itself says where a request comes from, so no
 * token is needed: Sec-Fetch-Site on https and loopback, Origin where a plain http address leaves it out, and a request
 * with neither is no browser's and must not carry a cookie.
 */
export function sameOriginOnly(publicOrigin: string): RequestHandler {
  return (req, _res, next) => {
    if (safe.has(req.method)) return next();
    const site = req.get('sec-fetch-site');
    const origin = req.get('origin');
    const ours =
      site !== undefined
        ? site === 'same-origin'
        : origin !== undefined
          ? origin === publicOrigin
          : req.get('cookie') === undefined;
    next(ours ? undefined : new Refusal('cross-origin', 'This request came from a page of another site.'));
  };
}
