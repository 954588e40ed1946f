import type { Submission } from '@nightcone/contracts';

/** What a row says: a submission is active, but people ask whether it runs, waits for its turn or for the night. */
export function workState({ state, when, progress }: Submission): string {
  if (state !== 'active') return state;
  if (progress.running > 0) return 'running';
  if (progress.done > 0 && progress.done + progress.failed < progress.total) return 'running';
  return when === 'tonight' ? 'tonight' : 'waiting';
}

/** Page of a submission's sweep or job. */
export const addressOfWork = (row: Pick<Submission, 'sweepId' | 'jobHash'>): string | undefined =>
  row.sweepId ? `/sweeps/${row.sweepId}` : row.jobHash ? `/jobs/${row.jobHash}` : undefined;
