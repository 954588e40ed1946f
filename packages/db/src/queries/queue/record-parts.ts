import type { Pool, PoolClient } from 'pg';
import type { Chunk, Order, PartRecord, WorkerDescription } from '../../queue-types.ts';
import { packPieces, rowBytes, splitRows } from './pieces.ts';
import { storeArrays } from './store-arrays.ts';

/**
 * Records finished parts under the fence of their lease, in one transaction with everything that follows from it: parts,
 * payloads, results, jobs, executions, counts of the submission, and the settlement of the quota. Safe to repeat.
 */
export async function recordParts(
  pool: Pool,
  chunk: Chunk,
  worker: WorkerDescription,
  records: readonly PartRecord[],
): Promise<Order> {
  const results = records.flatMap((record) => (record.outcome === 'result' ? [record.result] : []));
  await storeArrays(pool, chunk, results);
  const client = await pool.connect();
  let broken: Error | undefined;
  try {
    await client.query('begin');
    await storePayloads(client, chunk, records);
    const { rows } = await client.query<{ order: Order }>('select queue.record($1, $2, $3, $4, $5) as "order"', [
      chunk.id,
      chunk.attempt,
      worker.id,
      worker.speedFactor,
      JSON.stringify(records.map(toRow)),
    ]);
    await client.query('commit');
    return (rows[0] as { order: Order }).order;
  } catch (error) {
    broken = error as Error;
    throw error;
  } finally {
    client.release(broken);
  }
}

function toRow(record: PartRecord) {
  const { index, cpuUs, outcome } = record;
  const base = { index, cpu_us: Math.round(cpuUs), outcome };
  if (outcome === 'failure') return { ...base, code: record.code, text: record.text };
  if (outcome === 'payloads') return base;
  const { digest, arrays, certificate } = record.result;
  return { ...base, digest, arrays, certificate, bytes: arrays.reduce((sum, { bytes }) => sum + bytes, 0) };
}

/** Under the lock on the lease, so that a successor cannot be storing the same rows. */
async function storePayloads(client: PoolClient, chunk: Chunk, records: readonly PartRecord[]): Promise<void> {
  const rows = records.flatMap((record) => {
    if (record.outcome !== 'payloads') return [];
    const from = chunk.tasks.find(({ index }) => index === record.index)?.sliceFrom;
    if (from === undefined) throw new Error(`part ${record.index} is not in chunk ${chunk.id}`);
    return record.payloads.flatMap((payload, i) =>
      splitRows(payload).map((data, number) => ({ index: record.index, slice: from + i, number, data })),
    );
  });
  for (const batch of packPieces(rows, 2 * rowBytes, 5_000)) {
    await client.query(
      `with fence as (select submission_id from leases where chunk_id = $1 and attempt = $2 for no key update)
       insert into part_rows (submission_id, index, slice, number, data)
       select submission_id, i, slice, n, substring($8::bytea from at + 1 for length)
         from fence, unnest($3::int[], $4::int[], $5::int[], $6::int[], $7::int[]) as t(i, slice, n, at, length)
        where not exists (select from parts p where p.submission_id = fence.submission_id and p.index = i)
       on conflict do nothing`,
      [
        chunk.id,
        chunk.attempt,
        batch.pieces.map(({ index }) => index),
        batch.pieces.map(({ slice }) => slice),
        batch.pieces.map(({ number }) => number),
        batch.offsets,
        batch.pieces.map(({ data }) => data.byteLength),
        batch.bytes,
      ],
    );
  }
}
