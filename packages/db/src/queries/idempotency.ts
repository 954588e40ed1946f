import { sql } from 'drizzle-orm';
import type { Db, Transaction } from '../client.ts';
import { IdempotencyMismatch } from '../errors.ts';
import { isConflict } from '../retry.ts';

/** The key that a client sent, and the SHA-256 of endpoint and body that it stands for. */
export interface IdempotencyKey {
  accountId: string;
  key: string;
  requestHash: string;
}

/**
 * Does `work` in one transaction, once per key: a repetition gets the first answer (a JSON value), another request under
 * the same key is refused with IdempotencyMismatch. A repetition that comes while the first is at work waits for it.
 */
export async function once<T>(db: Db, key: IdempotencyKey | null, work: (tx: Transaction) => Promise<T>): Promise<T> {
  for (;;) {
    try {
      return await db.transaction(async (tx) => {
        const earlier = key ? await claimKey(tx, key) : undefined;
        if (earlier) return earlier.response as T;
        const response = await work(tx);
        if (key) {
          await tx.execute(
            sql`update idempotency_keys set response = ${JSON.stringify(response)}::jsonb where account_id = ${key.accountId} and key = ${key.key}`,
          );
        }
        return response;
      });
    } catch (error) {
      // a deadlock has undone everything
      if (!isConflict(error)) throw error;
    }
  }
}

async function claimKey(tx: Transaction, { accountId, key, requestHash }: IdempotencyKey) {
  const inserted = await tx.execute(
    sql`insert into idempotency_keys (account_id, key, request_hash) values (${accountId}, ${key}, ${requestHash})
        on conflict do nothing`,
  );
  if (inserted.rowCount === 1) return undefined;
  const { rows } = await tx.execute<{ requestHash: string; response: unknown }>(
    sql`select request_hash as "requestHash", response from idempotency_keys where account_id = ${accountId} and key = ${key}`,
  );
  const [found] = rows;
  if (found?.requestHash !== requestHash) throw new IdempotencyMismatch(key);
  return found;
}
