import type { ClientBase, Pool } from 'pg';
import type { WorkerDescription } from '../../queue-types.ts';

/** A process joins. Called again after a lost answer it changes nothing. */
export async function registerWorker(pool: Pool, worker: WorkerDescription): Promise<void> {
  await pool.query(
    `insert into workers (id, host, pid, slots, memory_bytes, speed_factor) values ($1, $2, $3, $4, $5, $6)
     on conflict (id) do nothing`,
    [worker.id, worker.host, worker.pid, worker.slots, Math.floor(worker.memoryBytes), worker.speedFactor],
  );
}

/** Sign of life; a silent worker that speaks again is active again. */
export async function beatWorker(pool: Pool, id: string): Promise<void> {
  await pool.query(
    `update workers set heartbeat_at = now(), state = case state when 'silent' then 'active' else state end
      where id = $1 and state <> 'stopped'`,
    [id],
  );
}

export async function stopWorker(pool: Pool, id: string): Promise<void> {
  await pool.query(`update workers set state = 'stopped', stopped_at = now() where id = $1 and state <> 'stopped'`, [
    id,
  ]);
}

/** Whether this worker takes work now: not while it winds down, nor outside its own hours. */
export async function mayWork(client: ClientBase, id: string): Promise<boolean> {
  const { rows } = await client.query<{ may: boolean }>('select queue.may_work($1) as may', [id]);
  return rows[0]?.may === true;
}

/** Kernels that a process has loaded, for the page of workers. */
export async function noteKernels(pool: Pool, id: string, digests: readonly string[]): Promise<void> {
  await pool.query('update workers set kernel_digests = $2 where id = $1', [id, digests]);
}
