import type { endpoints } from '@nightcone/contracts';
import { findOptionalExecution, listExecutionEvents, listExecutionsOfJob } from '@nightcone/db';
import type { Handler } from '../../context.ts';
import { notFound } from '../../refusal.ts';
import { readLabels } from '../../scheduling/people.ts';
import { executionView, firstExecution } from './job-view.ts';

export const getExecution: Handler<typeof endpoints.getExecution> = async ({ ctx, input }) => {
  const { db } = ctx.services;
  const row = await findOptionalExecution(db, input.params.id, ctx.caller.account.id);
  if (!row) throw notFound('execution');
  const [labels, events, all] = await Promise.all([
    readLabels(db, ctx.caller),
    listExecutionEvents(db, [row.id]),
    listExecutionsOfJob(db, row.jobHash),
  ]);
  return executionView(row, firstExecution(all), labels, events);
};
