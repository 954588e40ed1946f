import type { endpoints, SubmissionState } from '@nightcone/contracts';
import {
  type Actor,
  cancelSubmission as cancel,
  type Db,
  findOptionalSubmission,
  pauseSubmission as pause,
  resumeSubmission as resume,
} from '@nightcone/db';
import type { Context, Handler, Input } from '../../context.ts';
import { notFound, Refusal } from '../../refusal.ts';
import { readLabels } from '../../scheduling/people.ts';
import { readSchedule } from '../../scheduling/read-schedule.ts';
import { submissionView } from '../../scheduling/submission-view.ts';

type Control = (typeof endpoints)['pauseSubmission' | 'resumeSubmission' | 'cancelSubmission'];

/** One's own work, and for admins everybody's; a change that came too late says what had happened before. */
async function control(
  { ctx, input }: { ctx: Context<Control>; input: Input<Control> },
  change: (db: Db, actor: Actor, id: string) => Promise<boolean>,
  late: (state: SubmissionState) => string,
) {
  const { db } = ctx.services;
  const { account } = ctx.caller;
  const { id } = input.params;
  const before = await findOptionalSubmission(db, id);
  if (!before || (before.accountId !== account.id && account.role !== 'admin')) throw notFound('submission');
  const changed = await change(db, { accountId: account.id, requestId: ctx.requestId }, id);
  const after = await findOptionalSubmission(db, id);
  if (!after) throw notFound('submission');
  if (!changed) throw new Refusal('conflict', late(after.state));
  const [schedule, labels] = await Promise.all([readSchedule(db), readLabels(db, ctx.caller)]);
  return submissionView(after, schedule, labels, ctx.caller);
}

export const pauseSubmission: Handler<typeof endpoints.pauseSubmission> = (given) =>
  control(given, pause, (state) => `It is ${state}; only active work can be paused.`);

export const resumeSubmission: Handler<typeof endpoints.resumeSubmission> = (given) =>
  control(given, resume, (state) => `It is ${state}; only paused work can be resumed.`);

export const cancelSubmission: Handler<typeof endpoints.cancelSubmission> = (given) =>
  control(given, cancel, (state) => `It is ${state} already.`);
