import { type PointState, pointStates, type Sweep } from '@nightcone/contracts';
import type { LeanSweepRow, SubmissionRow } from '@nightcone/db';
import type { Caller } from '../../context.ts';
import type { Labels } from '../../scheduling/people.ts';
import type { Schedule } from '../../scheduling/read-schedule.ts';
import { submissionView } from '../../scheduling/submission-view.ts';

export interface SweepCircumstances {
  schedule: Schedule;
  labels: Labels;
  caller: Caller;
}

export const sweepView = (
  row: LeanSweepRow,
  submission: SubmissionRow,
  counts: Partial<Record<PointState, number>>,
  { schedule, labels, caller }: SweepCircumstances,
): Omit<Sweep, 'axes' | 'specification'> => ({
  id: row.id,
  title: row.title,
  model: row.model,
  submission: submissionView(submission, schedule, labels, caller),
  createdAt: row.createdAt.toISOString(),
  points: submission.points,
  counts: Object.fromEntries(pointStates.map((state) => [state, counts[state] ?? 0])) as Sweep['counts'],
});
