import { operationsPerMs } from '@nightcone/contracts';
import type { LoadedKernel } from '@nightcone/kernel/node';
import { evaluateExpression, type ModelManifest, parseSpecification, type Specification } from '@nightcone/models';
import type { ComputeThread } from '../../threads/compute-thread.ts';
import type { Outcome, ThreadTask } from '../../threads/messages.ts';

/** One job for each kind of work that kernels do: closed-form tables, real and complex eigenvalue problems. */
const goldenJobs = [
  {
    model: 'landau-levels',
    parameters: {
      fieldT: { kind: 'range', start: 1, stop: 20, count: 61 },
      energyEv: { kind: 'range', start: -0.4, stop: 0.4, count: 201 },
    },
  },
  {
    model: 'continuum-ribbon',
    parameters: {
      edge: { kind: 'zigzag' },
      width: { kind: 'nm', widthNm: 60 },
      fieldT: 5,
      kPerNm: { kind: 'range', start: -0.2, stop: 0.2, count: 21 },
    },
  },
  {
    model: 'continuum-ribbon',
    parameters: {
      edge: { kind: 'armchair' },
      width: { kind: 'dimer-lines', count: 40 },
      kPerNm: { kind: 'range', start: -1, stop: 1, count: 41 },
    },
  },
];

/** Beyond these a measurement says more about a disturbance than about the machine. */
const bounds = { least: 0.1, most: 10 };

/**
 * Reference CPU per measured CPU of this machine: 1 on the machine on which costs were calibrated, 2 where the same
 * work takes half the time. The jobs are computed twice; the first time also compiles.
 */
export async function measureSpeed(kernel: LoadedKernel, thread: ComputeThread): Promise<number> {
  const jobs = goldenJobs.flatMap((job): { specification: Specification; model: ModelManifest }[] => {
    const parsed = parseSpecification(kernel.manifest, { ...job, kernel: kernel.digest });
    const model = kernel.manifest.models.find(({ id }) => id === job.model);
    return parsed.ok && model ? [{ specification: parsed.specification, model }] : [];
  });
  if (jobs.length === 0) return 1;
  const referenceMs = jobs.reduce((sum, { specification, model }) => {
    return (
      sum +
      (evaluateExpression(model.cost, model, specification) +
        evaluateExpression(model.assembleCost, model, specification)) /
        operationsPerMs
    );
  }, 0);
  const tasks = jobs.map(
    ({ specification }, id): ThreadTask => ({
      id,
      kind: 'whole',
      job: {
        hash: `golden ${id}`,
        kernel: kernel.digest,
        module: kernel.module,
        specification: JSON.stringify(specification),
        tables: new Map(),
      },
    }),
  );
  await run(thread, tasks);
  const outcomes = await run(thread, tasks);
  const measuredMs = outcomes.reduce((sum, { cpuMs }) => sum + cpuMs, 0);
  const complete = outcomes.length === tasks.length && outcomes.every(({ status }) => status === 'assembled');
  if (!complete || measuredMs <= 0 || referenceMs <= 0) return 1;
  return Math.min(bounds.most, Math.max(bounds.least, referenceMs / measuredMs));
}

async function run(thread: ComputeThread, tasks: ThreadTask[]): Promise<Outcome[]> {
  const outcomes: Outcome[] = [];
  await thread.run(tasks, { outcomes: (some) => void outcomes.push(...some) });
  return outcomes;
}
