import { operationsPerMs } from '@nightcone/contracts';
import { type Db, type PlannedJob, type Submitter, submitSweep } from '@nightcone/db';
import type { LoadedKernel } from '@nightcone/kernel/node';
import {
  evaluateExpression,
  type Json,
  type ModelManifest,
  parseSpecification,
  planSweep,
  type Specification,
  type SweepAxis,
} from '@nightcone/models';
import { canonicalText, jobHash } from '@nightcone/provenance';

export interface Question {
  model: string;
  parameters?: { [name: string]: Json };
  numerics?: { [name: string]: Json };
}

/** The jobs of a sweep over a real kernel, as the API would plan them. */
export async function planJobs(kernel: LoadedKernel, question: Question, axes: SweepAxis[]): Promise<PlannedJob[]> {
  const base = parseSpecification(kernel.manifest, { ...question, kernel: kernel.digest });
  if (!base.ok) throw new Error(JSON.stringify(base.problems));
  const model = kernel.manifest.models.find(({ id }) => id === question.model) as ModelManifest;
  const plan = planSweep(kernel.manifest, base.specification, axes);
  return Promise.all(
    Array.from({ length: plan.count }, (_, index) => {
      const point = plan.point(index);
      if (!point.ok) throw new Error(JSON.stringify(point.problems));
      return plannedJob(model, point.specification);
    }),
  );
}

async function plannedJob(model: ModelManifest, specification: Specification): Promise<PlannedJob> {
  const read = (expression: ModelManifest['cost']) => evaluateExpression(expression, model, specification);
  return {
    hash: await jobHash(specification),
    canonicalText: canonicalText(specification),
    model: specification.model,
    kernelDigest: specification.kernel,
    questionDigest: null,
    tables: [],
    estimatedMs: (read(model.cost) + read(model.assembleCost)) / operationsPerMs,
    slices: read(model.sliceCount),
    resultBytes: read(model.resultBytes),
    memoryBytes: Math.max(read(model.sliceBytes), read(model.assembleBytes)),
  };
}

/** Submits planned jobs as one sweep that starts now. The id of its submission. */
export async function submitPlanned(db: Db, submitter: Submitter, jobs: PlannedJob[]): Promise<string> {
  const { submissionId } = await submitSweep(db, submitter, null, {
    title: 'planned sweep',
    model: jobs[0]?.model ?? '',
    tonight: false,
    definition: { specification: {}, axes: [{ pointers: ['/number'], values: jobs.map((_, place) => [place]) }] },
    jobs,
    points: jobs.map(({ hash }, place) => ({ jobHash: hash, place, values: [place] })),
  });
  return submissionId;
}
