import type { Db } from '../../client.ts';
import { saveAuditEntry } from '../audit.ts';
import { type IdempotencyKey, once } from '../idempotency.ts';
import { type PlannedJob, type Submitter, saveJobs, saveSubmission } from './save-submission.ts';

export interface NewJob {
  title: string;
  tonight: boolean;
  job: PlannedJob;
}

export interface SubmittedJob {
  hash: string;
  submissionId: string;
  alreadyComputed: boolean;
}

/** Submits one job in one transaction. Throws QuotaExceeded and IdempotencyMismatch; then nothing has changed. */
export function submitJob(
  db: Db,
  submitter: Submitter,
  key: Omit<IdempotencyKey, 'accountId'> | null,
  { title, tonight, job }: NewJob,
): Promise<SubmittedJob> {
  return once(db, key && { ...key, accountId: submitter.accountId }, async (tx) => {
    await saveJobs(tx, submitter, [job]);
    const { submissionId, alreadyComputed } = await saveSubmission(tx, submitter, {
      kind: 'job',
      title,
      model: job.model,
      tonight,
      points: [{ jobHash: job.hash, place: 0, values: [] }],
    });
    await saveAuditEntry(tx, submitter, {
      action: 'jobs.submit',
      subject: 'job',
      subjectId: job.hash,
      after: { submissionId, alreadyComputed: alreadyComputed > 0, tonight },
    });
    return { hash: job.hash, submissionId, alreadyComputed: alreadyComputed > 0 };
  });
}
