import type { endpoints } from '@nightcone/contracts';
import { findQuota, listEndedJobs } from '@nightcone/db';
import type { Handler } from '../../context.ts';
import { findPlanningKernel } from '../../planning/find-kernel.ts';
import type { PlannedPoint } from '../../planning/plan-question.ts';
import { forecastWith, readSchedule, type Schedule } from '../../scheduling/read-schedule.ts';
import { expected } from '../../scheduling/submission-view.ts';

/** Parts are cut to about this length. */
const partMs = 2000;

/** The dry run of a submission: the same plan, nothing stored. */
export const estimateSweep: Handler<typeof endpoints.estimateSweep> = async ({ ctx, input }) => {
  const { db, planner } = ctx.services;
  const { specification, axes } = input.body;
  const me = ctx.caller.account.id;
  const kernel = await findPlanningKernel(db, specification.kernel);
  const totals = { alreadyComputed: 0, open: 0, cpuMs: 0, resultBytes: 0, slices: 0 };
  const add = async (points: PlannedPoint[]) => {
    const ended = new Set(
      await listEndedJobs(
        db,
        points.map(({ hash }) => hash),
      ),
    );
    for (const { hash, estimatedMs, resultBytes, slices } of points) {
      if (ended.has(hash)) totals.alreadyComputed += 1;
      else {
        totals.open += 1;
        totals.cpuMs += estimatedMs;
        totals.resultBytes += resultBytes;
        totals.slices += slices;
      }
    }
  };
  const plan = { kernel, question: { specification, axes }, full: false, signal: ctx.signal, onBatch: add };
  const summary = await planner.plan(plan);
  const [balance, schedule] = await Promise.all([findQuota(db, me), readSchedule(db)]);
  const { grantedMs, usedMs, reservedMs } = balance;
  const { open, ...sums } = totals;
  const afterMs = grantedMs - usedMs - reservedMs - Math.ceil(sums.cpuMs);
  return {
    jobs: summary.count,
    ...sums,
    notes: summary.notes,
    quota: { grantedMs, usedMs, reservedMs, afterMs, fits: afterMs >= 0 || sums.cpuMs === 0 },
    finish: {
      now: finish(schedule, me, 'now', sums.cpuMs, open),
      tonight: finish(schedule, me, 'tonight', sums.cpuMs, open),
    },
    first: summary.first,
  };
};

/** When it would end if it were submitted now, behind and beside what is there already. */
function finish(schedule: Schedule, accountId: string, when: 'now' | 'tonight', cpuMs: number, open: number) {
  if (open === 0) return { at: schedule.now.toISOString(), plusMinusS: 0 };
  const { speed } = schedule.capacity;
  const asked = {
    submissionId: 'asked',
    accountId,
    when,
    paused: false,
    priority: 0,
    createdAt: schedule.now,
    remainingMs: Math.max(1, cpuMs / speed),
    partMs: Math.min(partMs, cpuMs / open) / speed,
    done: 0,
  };
  return expected(forecastWith(schedule, [asked]).ends.get('asked'));
}
