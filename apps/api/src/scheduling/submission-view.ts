import type { Expected, Submission } from '@nightcone/contracts';
import type { SubmissionRow } from '@nightcone/db';
import { findModel } from '@nightcone/models';
import type { Caller } from '../context.ts';
import { explainWait } from './explain-wait.ts';
import type { Labels } from './people.ts';
import type { Schedule } from './read-schedule.ts';

export function submissionView(row: SubmissionRow, schedule: Schedule, labels: Labels, caller: Caller): Submission {
  const mine = row.accountId === caller.account.id;
  const open = row.state === 'active' || row.state === 'paused';
  return {
    id: row.id,
    kind: row.kind,
    // What somebody else called their work is theirs; what is computed shows.
    title: mine || caller.account.role === 'admin' ? row.title : (findModel(row.model)?.title ?? row.model),
    model: row.model,
    owner: labels.person(row.accountId),
    mine,
    state: row.state,
    when: row.tonight ? 'tonight' : 'now',
    priority: row.priority,
    sweepId: mine ? row.sweepId : null,
    jobHash: mine ? row.jobHash : null,
    unit: row.kind === 'sweep' ? 'jobs' : 'slices',
    progress: row.kind === 'sweep' ? pointProgress(row) : sliceProgress(row),
    estimatedMs: row.estimatedMs,
    reservedMs: row.reservedMs,
    usedMs: row.usedUs / 1000,
    createdAt: row.createdAt.toISOString(),
    startedAt: row.startedAt?.toISOString() ?? null,
    finishedAt: row.finishedAt?.toISOString() ?? null,
    expectedEnd: open ? expected(schedule.forecast.ends.get(row.id)) : null,
    why: open ? explainWait(row, schedule) : '',
  };
}

export const expected = (end: { at: Date; plusMinusS: number } | undefined): Expected | null =>
  end ? { at: end.at.toISOString(), plusMinusS: Math.round(end.plusMinusS) } : null;

const pointProgress = ({ donePoints, failedPoints, points, runningPoints }: SubmissionRow) => ({
  done: donePoints - failedPoints,
  total: points,
  running: Math.min(runningPoints, points - donePoints),
  failed: failedPoints,
});

function sliceProgress(row: SubmissionRow) {
  // Of a job that was known already no slice is left to compute; it counts as one that is done.
  const total = Math.max(1, row.totalSlices);
  const failed = row.failedPoints > 0 ? 1 : 0;
  const done = row.state === 'done' ? total - failed : Math.min(total, row.doneSlices);
  const openParts = Math.max(0, row.openParts - row.recordedOpenParts);
  const running = Math.min(total - done - failed, Math.ceil((openParts * total) / row.partsPerJob));
  return { done, total, running: Math.max(0, running), failed };
}
