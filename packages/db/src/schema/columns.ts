import { type SQL, sql } from 'drizzle-orm';
import { customType, timestamp } from 'drizzle-orm/pg-core';

/** Raw bytes; the driver's Buffer itself, no copy. */
export const bytea = customType<{ data: Buffer }>({ dataType: () => 'bytea' });

/** A set of whole numbers as PostgreSQL prints it: `{[0,12),[14,15)}`. */
export const multirange = customType<{ data: string }>({ dataType: () => 'int4multirange' });

export const instant = () => timestamp({ withTimezone: true, mode: 'date' });

/** The text of a CHECK that a column holds one word of a list that contracts owns. */
export const oneOf = (column: string, words: readonly string[]): SQL =>
  sql.raw(`${column} in (${words.map((word) => `'${word}'`).join(', ')})`);

/** The text of a CHECK that a column holds a SHA-256 in lower-case hexadecimal. */
export const isDigest = (column: string): SQL => sql.raw(`${column} ~ '^[0-9a-f]{64}$'`);
