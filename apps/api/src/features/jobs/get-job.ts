import type { endpoints } from '@nightcone/contracts';
import { findOptionalJob, listExecutionEvents, listExecutionsOfJob, listSweepsOfJob } from '@nightcone/db';
import { findModel, NoteCollector, type Specification } from '@nightcone/models';
import type { Handler } from '../../context.ts';
import { notFound } from '../../refusal.ts';
import { readLabels } from '../../scheduling/people.ts';
import { executionView, firstExecution, jobSummary } from './job-view.ts';

export const getJob: Handler<typeof endpoints.getJob> = async ({ ctx, input }) => {
  const { db } = ctx.services;
  const me = ctx.caller.account.id;
  const { hash } = input.params;
  const job = await findOptionalJob(db, hash, me);
  if (!job) throw notFound('job');
  const [labels, executions, sweeps] = await Promise.all([
    readLabels(db, ctx.caller),
    listExecutionsOfJob(db, hash),
    listSweepsOfJob(db, hash, me),
  ]);
  const events = await listExecutionEvents(
    db,
    executions.map(({ id }) => id),
  );
  const first = firstExecution(executions);
  const specification = job.specification as Specification;
  const notes = new NoteCollector();
  notes.add(0, findModel(job.model)?.notes(specification) ?? []);
  return {
    ...jobSummary(job, labels),
    specification: specification as never,
    canonicalText: job.canonicalText,
    notes: notes.summary(),
    estimate: { cpuMs: job.estimatedMs, resultBytes: job.resultBytes, slices: job.slices },
    certificate: job.certificate,
    arrays: job.arrays ?? [],
    executions: executions.map((row) => executionView(row, first, labels, events)),
    failure: job.failureCode === null ? null : { code: job.failureCode, text: job.failureText ?? '' },
    sweeps: sweeps.map(({ id, title }) => ({ id, title })),
  };
};
