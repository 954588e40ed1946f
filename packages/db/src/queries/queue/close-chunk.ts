import type { ClientBase } from 'pg';
import type { Chunk } from '../../queue-types.ts';

/**
 * Ends the lease of this attempt. False: it was not there, because another attempt has taken over or because this very
 * call was carried out before and only its answer was lost; in both cases there is nothing left to do.
 */
export async function dropLease(client: ClientBase, { id, attempt }: Chunk): Promise<boolean> {
  const { rowCount } = await client.query('delete from leases where chunk_id = $1 and attempt = $2', [id, attempt]);
  return rowCount === 1;
}

/** Closes a chunk whose lease has ended: the rest goes back to the backlog, or is dropped if cancelled. */
export async function closeChunk(client: ClientBase, id: string): Promise<void> {
  await client.query('select queue.close($1)', [id]);
}

/** After a broken attempt. `last`: no further attempt, the first part not recorded is broken off. */
export async function closeDeadChunk(
  client: ClientBase,
  { chunkId, reason, cpuUs, last }: { chunkId: string; reason: string; cpuUs: number; last: boolean },
): Promise<void> {
  await client.query('select queue.break_off($1, $2, $3, $4)', [chunkId, reason, Math.round(cpuUs), last]);
}

export interface LostLease {
  chunkId: string;
  worker: string;
  cpuUs: number;
}

/** Takes the leases that had no heartbeat for `leaseMs`. Those that somebody is writing at this moment are alive. */
export async function reapLeases(client: ClientBase, leaseMs: number): Promise<LostLease[]> {
  const { rows } = await client.query<{ chunkId: string; worker: string; cpuUs: string }>(
    'select chunk_id as "chunkId", worker, cpu_us as "cpuUs" from queue.reap($1)',
    [leaseMs],
  );
  return rows.map((row) => ({ ...row, cpuUs: Number(row.cpuUs) }));
}
