import { and, eq, sql } from 'drizzle-orm';
import type { Queryable } from '../../client.ts';
import { tableHoldings } from '../../schema/tables.ts';

/** Of these tables, those that this person holds. */
export async function listHeldTables(db: Queryable, accountId: string, digests: readonly string[]): Promise<string[]> {
  if (digests.length === 0) return [];
  const rows = await db
    .selectDistinct({ digest: tableHoldings.tableDigest })
    .from(tableHoldings)
    .where(
      and(
        eq(tableHoldings.accountId, accountId),
        sql`${tableHoldings.tableDigest} = any(${sql.param([...digests])}::text[])`,
      ),
    );
  return rows.map(({ digest }) => digest);
}
