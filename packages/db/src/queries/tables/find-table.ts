import { eq } from 'drizzle-orm';
import type { Queryable } from '../../client.ts';
import { tables } from '../../schema/tables.ts';

/** A table with its columns as bytes. */
export async function findOptionalTable(db: Queryable, digest: string) {
  const [row] = await db
    .select({ columns: tables.columns, bytes: tables.bytes })
    .from(tables)
    .where(eq(tables.digest, digest));
  return row;
}
