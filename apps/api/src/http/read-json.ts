import type { IncomingMessage } from 'node:http';
import { limits } from '@nightcone/contracts';
import express, { type RequestHandler } from 'express';
import { Refusal } from '../refusal.ts';
import { pointer } from './problems.ts';

/** Bodies in which an escape may stand for what no text of the database can hold. */
const suspects = new WeakSet<IncomingMessage>();

/**
 * Reads a JSON body of at most `limits.bodyBytes`. U+0000 and halves of surrogate pairs are valid JSON and no text of the
 * database: they are refused with their place.
 */
export const readJson: RequestHandler[] = [
  express.json({
    limit: limits.bodyBytes,
    strict: false,
    type: ['application/json', 'application/*+json'],
    verify: (req, _res, bytes) => {
      if (bytes.includes('\\u0000') || bytes.includes('\\ud') || bytes.includes('\\uD')) suspects.add(req);
    },
  }),
  (req, _res, next) => {
    if (suspects.has(req)) refuseUnstorable(req.body);
    next();
  },
];

export function refuseUnstorable(value: unknown, path: readonly string[] = []): void {
  if (typeof value === 'string') {
    if (!value.includes('\0') && !/\p{Surrogate}/u.test(value)) return;
    const message = 'This text holds a character that cannot be stored (U+0000, or half of a surrogate pair).';
    throw new Refusal('invalid-input', message, { errors: [{ field: pointer(path), message }] });
  }
  if (typeof value !== 'object' || value === null) return;
  for (const [key, inner] of Object.entries(value)) {
    refuseUnstorable(key, path);
    refuseUnstorable(inner, [...path, key]);
  }
}
