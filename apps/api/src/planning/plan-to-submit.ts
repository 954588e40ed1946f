import type { NoteSummary } from '@nightcone/contracts';
import { listHeldTables, type NewPoint, type PlannedJob } from '@nightcone/db';
import { findModel, noteText } from '@nightcone/models';
import type { Caller } from '../context.ts';
import { Refusal } from '../refusal.ts';
import type { Services } from '../services.ts';
import { findPlanningKernel } from './find-kernel.ts';
import type { PlannedPoint, Question } from './plan-question.ts';
import { SortedJobs } from './sorted-jobs.ts';

interface Submitting {
  services: Services;
  caller: Caller;
  signal: AbortSignal;
}

/**
 * Plans a question in full and refuses what may not be submitted, before anything is stored. Gathers batch by batch: of
 * 100 000 points no single step may hold the event loop.
 */
export async function planToSubmit({ services, caller, signal }: Submitting, question: Question) {
  const kernel = await findPlanningKernel(services.db, question.specification.kernel);
  const { model } = question.specification;
  const jobs = new SortedJobs();
  const points: NewPoint[] = [];
  const tables = new Set<string>();
  const summary = await services.planner.plan({
    kernel,
    question,
    full: true,
    signal,
    onBatch: (batch) => {
      for (const point of batch) {
        jobs.add(plannedJob(point, model, kernel.digest));
        points.push({ jobHash: point.hash, place: point.index, values: point.values });
        for (const digest of point.tables) tables.add(digest);
      }
    },
  });
  // What today's definitions say of an older kernel's model is shown, not enforced.
  if (kernel.current) refuseInvalid(model, summary.notes);
  await requireTables(services, caller, [...tables]);
  return { jobs: await jobs.inOrder(), points, summary };
}

const plannedJob = (point: PlannedPoint, model: string, kernelDigest: string): PlannedJob => ({
  hash: point.hash,
  canonicalText: point.canonicalText ?? '',
  model,
  kernelDigest,
  questionDigest: point.questionDigest ?? null,
  tables: point.tables,
  estimatedMs: point.estimatedMs,
  slices: point.slices,
  resultBytes: point.resultBytes,
  memoryBytes: point.memoryBytes,
});

function refuseInvalid(model: string, notes: readonly NoteSummary[]): void {
  const refused = notes.filter(({ severity }) => severity === 'refuse');
  if (refused.length === 0) return;
  const definition = findModel(model);
  const errors = refused.map(({ code, field, unit, limit, worst, points, firstPoints }) => {
    const text = definition ? noteText(definition, { code, value: worst, limit, unit }) : code;
    return {
      field: `/specification${field}`,
      message: points > 1 ? `${text} (${points} points, first ${firstPoints[0]})` : text,
      value: worst,
      limit: `${limit}${unit ? ` ${unit}` : ''}`,
    };
  });
  throw new Refusal('validity-refused', errors[0]?.message ?? 'The model does not hold here.', { errors });
}

/** A table that one does not hold is as unknown as none. */
async function requireTables({ db }: Services, { account }: Caller, wanted: readonly string[]): Promise<void> {
  const held = new Set(await listHeldTables(db, account.id, wanted));
  const missing = wanted.filter((digest) => !held.has(digest));
  if (missing.length === 0) return;
  const errors = missing.map((value) => ({
    field: '/specification/tables',
    message: `There is no table ${value.slice(0, 12)}… among yours.`,
    value,
  }));
  throw new Refusal('invalid-specification', errors[0]?.message ?? 'A table is missing.', { errors });
}
