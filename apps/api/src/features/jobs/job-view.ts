import type { Execution, JobSummary } from '@nightcone/contracts';
import type { ExecutionRow, JobSummaryRow, listExecutionEvents } from '@nightcone/db';
import { jobTitle } from '../../job-title.ts';
import type { Labels } from '../../scheduling/people.ts';

export const jobSummary = (row: JobSummaryRow, labels: Labels): JobSummary => ({
  hash: row.hash,
  model: row.model,
  title: jobTitle(row.specification),
  state: row.state,
  kernel: row.kernelDigest,
  resultDigest: row.resultDigest,
  checkFailed: row.checkFailed,
  cpuMs: row.cpuMs,
  askedBy: labels.person(row.firstSubmittedBy),
  mine: row.mine,
  createdAt: row.createdAt.toISOString(),
  finishedAt: row.finishedAt?.toISOString() ?? null,
});

type EventRow = Awaited<ReturnType<typeof listExecutionEvents>>[number];

/** `firstId`: the execution that the job's result came from, against which the bits of all others are compared. */
export function executionView(
  row: ExecutionRow,
  firstId: string | undefined,
  labels: Labels,
  events: readonly EventRow[],
): Execution {
  const finished = row.state === 'finished';
  return {
    id: row.id,
    reason: row.reason,
    state: row.state,
    askedBy: labels.person(row.askedBy),
    startedAt: row.startedAt?.toISOString() ?? null,
    finishedAt: row.finishedAt?.toISOString() ?? null,
    cpuMs: row.cpuUs / 1000,
    workers: row.workers,
    resultDigest: row.resultDigest,
    bits: bitsOf(row, firstId),
    progress: {
      done: finished ? row.slices : Math.min(row.slices, row.doneSlices),
      total: row.slices,
      running: row.state === 'running' ? Math.min(row.slices - row.doneSlices, row.openSlices) : 0,
      failed: row.state === 'failed' ? 1 : 0,
    },
    failure: row.failureCode === null ? null : { code: row.failureCode, text: row.failureText ?? '' },
    log: [
      { at: row.createdAt.toISOString(), text: `asked for (${row.reason})` },
      ...(row.startedAt ? [{ at: row.startedAt.toISOString(), text: 'started' }] : []),
      ...events
        .filter(({ executionId }) => executionId === row.id)
        .map(({ at, text }) => ({ at: at.toISOString(), text })),
      ...(row.finishedAt ? [{ at: row.finishedAt.toISOString(), text: row.state }] : []),
    ].toSorted((a, b) => a.at.localeCompare(b.at)),
  };
}

/** The verdict is made of digests alone: equal digests are equal bits. */
function bitsOf({ id, resultDigest, firstDigest }: ExecutionRow, firstId: string | undefined): Execution['bits'] {
  if (resultDigest === null || firstDigest === null) return null;
  if (id === firstId) return 'first';
  return resultDigest === firstDigest ? 'identical' : 'different';
}

/** The earliest finished execution whose digest is the job's. */
export const firstExecution = (rows: readonly ExecutionRow[]): string | undefined =>
  rows
    .filter(({ resultDigest, firstDigest }) => resultDigest !== null && resultDigest === firstDigest)
    .toSorted((a, b) => (a.finishedAt?.getTime() ?? 0) - (b.finishedAt?.getTime() ?? 0))[0]?.id;
