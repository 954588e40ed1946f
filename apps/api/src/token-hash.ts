import { createHash } from 'node:crypto';

export const tokenPrefix = 'nct_';
/** Tokens have 256 random bits, so one round of SHA-256 keeps them as well as a slow hash would. */
export const tokenHash = (text: string) => createHash('sha256').update(text).digest('hex');
