import type { ClientBase } from 'pg';
import type { Chunk, Task, WorkerDescription } from '../../queue-types.ts';

interface ClaimRow extends Task {
  attempt: number;
  submissionId: string;
  budgetMs: number;
  memoryBytes: string;
}

/** Begins an attempt: a new lease. Null when the chunk must not run now; then it has been closed. Needs a transaction. */
export async function claimChunk(client: ClientBase, id: string, worker: WorkerDescription): Promise<Chunk | null> {
  const { rows } = await client.query<ClaimRow>(
    `select attempt, submission_id as "submissionId", budget_ms as "budgetMs", part_index as index, point,
            job_hash as "jobHash", execution_id as "executionId", specification, kernel_digest as "kernelDigest",
            slice_from as "sliceFrom", slice_to as "sliceTo", slices, kind,
            (select s.memory_bytes from submissions s where s.id = submission_id) as "memoryBytes"
       from queue.claim($1, $2)`,
    [id, worker.id],
  );
  const [first] = rows;
  if (!first) return null;
  const { attempt, submissionId, budgetMs, memoryBytes } = first;
  const tasks = rows.map(({ attempt: _a, submissionId: _s, budgetMs: _b, memoryBytes: _m, ...task }) => task);
  return { id, attempt, submissionId, budgetMs, memoryBytes: Number(memoryBytes), tasks };
}
