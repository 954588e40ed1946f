import { sql } from 'drizzle-orm';
import type { Db } from '../../client.ts';
import { type Actor, saveAuditEntry } from '../audit.ts';

/** Adds to (or takes from) what a person may use this week. Work that waited for it may start at once. */
export function adjustQuota(
  db: Db,
  actor: Actor,
  { accountId, ms, reason }: { accountId: string; ms: number; reason: string },
): Promise<void> {
  return db.transaction(async (tx) => {
    const { rows } = await tx.execute<{ id: string }>(sql`select queue.balance_of(${accountId}::uuid) as id`);
    const { id } = rows[0] as { id: string };
    await tx.execute(sql`select queue.post(${id}::uuid, 'adjust', ${ms}::bigint, 0, 0, ${reason})`);
    await tx.execute(sql`select pg_notify('nightcone', 'work')`);
    await saveAuditEntry(tx, actor, {
      action: 'quotas.adjust',
      subject: 'account',
      subjectId: accountId,
      after: { ms, reason },
    });
  });
}
