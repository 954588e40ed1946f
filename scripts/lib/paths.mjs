import { createHash } from 'node:crypto';
import path from 'node:path';
import { fileURLToPath } from 'node:url';

/** The checkout, and the folder for everything that a run on this machine leaves behind (ignored by git). */
export const root = path.resolve(path.dirname(fileURLToPath(import.meta.url)), '../..');
export const localDir = path.join(root, '.local');
/** Tells two checkouts on one machine apart. */
export const checkoutKey = createHash('sha256').update(root).digest('hex').slice(0, 12);
