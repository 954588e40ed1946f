import type { Pool } from 'pg';

/** Forgets what nobody asks about any more: old answers under idempotency keys, and chunks that ended long ago. */
export async function cleanUp(pool: Pool): Promise<void> {
  await pool.query(`delete from idempotency_keys where created_at < now() - interval '14 days'`);
  await pool.query(`delete from chunks where closed_at < now() - interval '60 days'`);
}
