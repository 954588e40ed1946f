import type { Pool } from 'pg';
import type { Heartbeat, Order } from '../../queue-types.ts';

/** One statement for all running chunks of a process; an order for each, `lost` where the lease is gone. */
export async function beatLeases(pool: Pool, heartbeats: readonly Heartbeat[]): Promise<Map<string, Order>> {
  if (heartbeats.length === 0) return new Map();
  const { rows } = await pool.query<{ id: string; order: Order }>(
    'select chunk_id as id, advice as "order" from queue.beat($1::uuid[], $2::int[], $3::bigint[], $4::real[])',
    [
      heartbeats.map(({ chunk }) => chunk.id),
      heartbeats.map(({ chunk }) => chunk.attempt),
      heartbeats.map(({ cpuUs }) => Math.round(cpuUs)),
      heartbeats.map(({ fraction }) => fraction),
    ],
  );
  return new Map(rows.map(({ id, order }) => [id, order]));
}
