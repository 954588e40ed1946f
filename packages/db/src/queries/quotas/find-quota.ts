import { desc, eq, sql } from 'drizzle-orm';
import type { Queryable } from '../../client.ts';
import { quotaBalances, quotaEntries } from '../../schema/quotas.ts';

export type QuotaBalanceRow = typeof quotaBalances.$inferSelect;
export type QuotaEntryRow = typeof quotaEntries.$inferSelect;

/** This week's balance of a person; the first question of a week opens it with its grant. */
export async function findQuota(db: Queryable, accountId: string): Promise<QuotaBalanceRow> {
  // the function may make the row, which its own statement does not see: two statements
  const { rows } = await db.execute<{ id: string }>(sql`select queue.balance_of(${accountId}::uuid) as id`);
  const [balance] = await db
    .select()
    .from(quotaBalances)
    .where(eq(quotaBalances.id, (rows[0] as { id: string }).id));
  return balance as QuotaBalanceRow;
}

/** Slots that a person's work may hold at once, and the weight of a person in the turn order. */
export async function findTurnLimits(db: Queryable, accountId: string): Promise<{ maxSlots: number; weight: number }> {
  const { rows } = await db.execute<{ maxSlots: number; weight: number }>(sql`
    select coalesce(t.max_slots, s.max_slots) as "maxSlots", coalesce(t.weight, 1) as weight
      from queue.settings() s left join turns t on t.account_id = ${accountId}::uuid`);
  return rows[0] as { maxSlots: number; weight: number };
}

/** The ledger of a balance, newest first. */
export function listQuotaEntries(db: Queryable, balanceId: string, limit = 500): Promise<QuotaEntryRow[]> {
  return db
    .select()
    .from(quotaEntries)
    .where(eq(quotaEntries.balanceId, balanceId))
    .orderBy(desc(quotaEntries.id))
    .limit(limit);
}

/** Use over the week so far, at most one step an hour. */
export async function listQuotaUse(db: Queryable, balanceId: string): Promise<{ at: Date; usedMs: number }[]> {
  const { rows } = await db.execute<{ at: string; usedMs: string }>(sql`
    select max(at) as at, (sum(sum(used_ms)) over (order by date_trunc('hour', at)))::bigint as "usedMs"
      from quota_entries where balance_id = ${balanceId}::uuid and used_ms <> 0
     group by date_trunc('hour', at) order by 1`);
  return rows.map(({ at, usedMs }) => ({ at: new Date(at), usedMs: Number(usedMs) }));
}
