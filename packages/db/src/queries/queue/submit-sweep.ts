import { computingOrder } from '@nightcone/contracts';
import type { Db } from '../../client.ts';
import { type SweepDefinition, sweeps } from '../../schema/sweeps.ts';
import { saveAuditEntry } from '../audit.ts';
import { type IdempotencyKey, once } from '../idempotency.ts';
import { type NewPoint, type PlannedJob, type Submitter, saveJobs, saveSubmission } from './save-submission.ts';

export interface NewSweep {
  title: string;
  model: string;
  tonight: boolean;
  definition: SweepDefinition;
  /** The distinct jobs of all points. */
  jobs: readonly PlannedJob[];
  /** One per place of the grid, by place. */
  points: readonly NewPoint[];
}

export interface SubmittedSweep {
  sweepId: string;
  submissionId: string;
  jobs: number;
  alreadyComputed: number;
}

/** Submits a sweep in one transaction. Throws QuotaExceeded and IdempotencyMismatch; then nothing has changed. */
export function submitSweep(
  db: Db,
  submitter: Submitter,
  key: Omit<IdempotencyKey, 'accountId'> | null,
  sweep: NewSweep,
): Promise<SubmittedSweep> {
  return once(db, key && { ...key, accountId: submitter.accountId }, async (tx) => {
    const { title, model, definition } = sweep;
    const shape = definition.axes.map(({ values }) => values.length);
    const points = computingOrder(shape).map((place) => sweep.points[place] as NewPoint);
    await saveJobs(tx, submitter, sweep.jobs);
    const { submissionId, alreadyComputed } = await saveSubmission(tx, submitter, { ...sweep, kind: 'sweep', points });
    const [saved] = await tx
      .insert(sweeps)
      .values({ submissionId, ownerId: submitter.accountId, title, model, definition })
      .returning({ id: sweeps.id });
    const sweepId = (saved as { id: string }).id;
    await saveAuditEntry(tx, submitter, {
      action: 'sweeps.submit',
      subject: 'sweep',
      subjectId: sweepId,
      after: { submissionId, points: points.length, alreadyComputed, tonight: sweep.tonight },
    });
    return { sweepId, submissionId, jobs: points.length, alreadyComputed };
  });
}
