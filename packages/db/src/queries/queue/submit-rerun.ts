import { eq } from 'drizzle-orm';
import type { Db } from '../../client.ts';
import { executions } from '../../schema/jobs/executions.ts';
import { jobs } from '../../schema/jobs/jobs.ts';
import { saveAuditEntry } from '../audit.ts';
import { type IdempotencyKey, once } from '../idempotency.ts';
import { type Submitter, saveSubmission } from './save-submission.ts';

export interface SubmittedRerun {
  executionId: string;
  submissionId: string;
}

/**
 * Asks for another execution of a job, whatever is stored of it, in one transaction. Undefined: there is no such job.
 * Throws QuotaExceeded and IdempotencyMismatch; then nothing has changed.
 */
export function submitRerun(
  db: Db,
  submitter: Submitter,
  key: Omit<IdempotencyKey, 'accountId'> | null,
  { jobHash, title }: { jobHash: string; title: string },
): Promise<SubmittedRerun | undefined> {
  return once(db, key && { ...key, accountId: submitter.accountId }, async (tx) => {
    const [job] = await tx.select({ model: jobs.model }).from(jobs).where(eq(jobs.hash, jobHash));
    if (!job) return undefined;
    const { submissionId } = await saveSubmission(tx, submitter, {
      kind: 're-run',
      title,
      model: job.model,
      tonight: false,
      points: [{ jobHash, place: 0, values: [] }],
    });
    const [execution] = await tx
      .insert(executions)
      .values({ jobHash, submissionId, point: 0, reason: 're-run', askedBy: submitter.accountId })
      .returning({ id: executions.id });
    const executionId = (execution as { id: string }).id;
    await saveAuditEntry(tx, submitter, {
      action: 'jobs.re-run',
      subject: 'job',
      subjectId: jobHash,
      after: { submissionId, executionId },
    });
    return { executionId, submissionId };
  });
}
