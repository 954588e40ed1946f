import type { Pool } from 'pg';
import type { Task } from '../../queue-types.ts';

/** Payloads of all slices of the job of an assembly, in slice order. */
export async function readPayloads(pool: Pool, submissionId: string, task: Task): Promise<Uint8Array[]> {
  const payloads: Uint8Array[][] = Array.from({ length: task.slices }, () => []);
  // one part at a time: the driver holds a whole answer in memory
  const { rows: found } = await pool.query<{ index: number }>(
    `select p.index from parts p, submissions s
      where s.id = $1 and p.submission_id = s.id and p.index < $2 and p.index >= $2 - s.parts_per_job
      order by p.index`,
    [submissionId, task.index],
  );
  for (const { index } of found) {
    const { rows } = await pool.query<{ slice: number; data: Buffer }>(
      'select slice, data from part_rows where submission_id = $1 and index = $2 order by slice, number',
      [submissionId, index],
    );
    for (const { slice, data } of rows) payloads[slice]?.push(data);
  }
  return payloads.map((rows, slice) => {
    if (rows.length === 0) throw new Error(`slice ${slice} of job ${task.jobHash} has no recorded payload`);
    return rows.length === 1 ? (rows[0] as Uint8Array) : Buffer.concat(rows);
  });
}
