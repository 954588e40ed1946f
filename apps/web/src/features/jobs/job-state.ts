import type { JobSummary } from '@nightcone/contracts';

/** `check failed` stands wherever the job does. */
export const jobStateWord = (job: Pick<JobSummary, 'state' | 'checkFailed'>): string =>
  job.state === 'finished' && job.checkFailed ? 'check failed' : job.state;
