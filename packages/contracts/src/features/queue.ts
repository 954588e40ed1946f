import { z } from 'zod';
import { endpoint, everyone, submitters } from '../endpoint.ts';
import { submissionStates, workerStates } from '../states.ts';
import { Expected, Id, Instant, Person, When } from './common.ts';

export const Progress = z.object({ done: z.int(), total: z.int(), running: z.int(), failed: z.int() });

export const Submission = z.object({
  id: Id,
  kind: z.enum(['sweep', 'job', 're-run']),
  title: z.string(),
  model: z.string(),
  owner: Person,
  mine: z.boolean(),
  state: z.enum(submissionStates),
  when: When,
  priority: z.int(),
  sweepId: Id.nullable(),
  jobHash: z.string().nullable(),
  /** Points (of a sweep) or slices (of a single job). */
  unit: z.enum(['jobs', 'slices']),
  progress: Progress,
  estimatedMs: z.number(),
  reservedMs: z.number(),
  usedMs: z.number(),
  createdAt: Instant,
  startedAt: Instant.nullable(),
  finishedAt: Instant.nullable(),
  expectedEnd: Expected.nullable(),
  /** 'Why has it not started?' as a sentence; empty once it runs. */
  why: z.string(),
});
export type Submission = z.infer<typeof Submission>;

export const NightBar = z.object({
  submissionId: Id.nullable(),
  /** Only on one's own bars. */
  title: z.string().nullable(),
  state: z.enum(['done', 'estimated', 'waiting']),
  from: Instant,
  to: Instant,
  slots: z.number(),
});
export const Night = z.object({
  from: Instant,
  to: Instant,
  now: Instant,
  timeZone: z.string(),
  window: z.object({ from: Instant, to: Instant, open: z.boolean() }),
  lanes: z.array(
    z.object({ label: z.string(), name: z.string().nullable(), mine: z.boolean(), bars: z.array(NightBar) }),
  ),
  myEnd: Expected.nullable(),
  slots: z.object({ total: z.int(), busy: z.int() }),
});
export type Night = z.infer<typeof Night>;

export const Quota = z.object({
  weekStart: Instant,
  weekEnd: Instant,
  grantedMs: z.number(),
  reservedMs: z.number(),
  usedMs: z.number(),
  maxSlots: z.int(),
  /** Use over the week so far, for the level line. */
  line: z.array(z.object({ at: Instant, usedMs: z.number() })),
});
export type Quota = z.infer<typeof Quota>;

export const QuotaEntry = z.object({
  id: z.int(),
  at: Instant,
  kind: z.enum(['grant', 'reserve', 'settle', 'release', 'adjust']),
  ms: z.number(),
  reason: z.string(),
  submissionId: Id.nullable(),
});

export const Worker = z.object({
  id: z.string(),
  host: z.string(),
  slots: z.int(),
  busy: z.int(),
  state: z.enum(workerStates),
  heartbeatAt: Instant,
  startedAt: Instant,
  speedFactor: z.number(),
});

export const LastNight = z.object({
  from: Instant,
  to: Instant,
  sweeps: z.int(),
  finished: z.int(),
  failed: z.int(),
  usedMs: z.number(),
  returnedMs: z.number(),
  largestResidualEv: z.number().nullable(),
  checksHeld: z.int(),
  checksMade: z.int(),
  failures: z.array(z.object({ code: z.string(), text: z.string(), points: z.int(), sweepId: Id.nullable() })),
  rows: z.array(
    z.object({
      sweepId: Id.nullable(),
      jobHash: z.string().nullable(),
      title: z.string(),
      model: z.string(),
      finished: z.int(),
      failed: z.int(),
      total: z.int(),
    }),
  ),
});
export type LastNight = z.infer<typeof LastNight>;

const bySubmission = {
  params: z.object({ id: Id }),
  response: Submission,
  scope: 'submit' as const,
  access: submitters,
};
export const queueEndpoints = {
  getNight: endpoint({
    id: 'getNight',
    method: 'get',
    path: '/queue/night',
    summary: 'The night strip: who runs what between dusk and dawn',
    access: everyone,
    scope: 'read',
    response: Night,
  }),
  getLastNight: endpoint({
    id: 'getLastNight',
    method: 'get',
    path: '/queue/last-night',
    summary: 'What the last night did with one’s own work',
    access: everyone,
    scope: 'read',
    response: LastNight,
  }),
  listSubmissions: endpoint({
    id: 'listSubmissions',
    method: 'get',
    path: '/submissions',
    summary: 'Running and waiting work, one’s own first',
    access: everyone,
    scope: 'read',
    query: z.object({ open: z.enum(['true', 'false']).default('true') }),
    response: z.object({ rows: z.array(Submission) }),
  }),
  getSubmission: endpoint({
    id: 'getSubmission',
    method: 'get',
    path: '/submissions/:id',
    summary: 'One submission, and why it has not started',
    access: everyone,
    scope: 'read',
    params: z.object({ id: Id }),
    response: Submission,
  }),
  pauseSubmission: endpoint({
    id: 'pauseSubmission',
    method: 'post',
    path: '/submissions/:id/pause',
    summary: 'Start nothing more of it',
    ...bySubmission,
  }),
  resumeSubmission: endpoint({
    id: 'resumeSubmission',
    method: 'post',
    path: '/submissions/:id/resume',
    summary: 'Go on',
    ...bySubmission,
  }),
  cancelSubmission: endpoint({
    id: 'cancelSubmission',
    method: 'post',
    path: '/submissions/:id/cancel',
    summary: 'Stop it; what is finished is kept',
    ...bySubmission,
  }),
  getQuota: endpoint({
    id: 'getQuota',
    method: 'get',
    path: '/quotas/mine',
    summary: 'This week’s quota',
    access: everyone,
    scope: 'read',
    response: Quota,
  }),
  listQuotaEntries: endpoint({
    id: 'listQuotaEntries',
    method: 'get',
    path: '/quotas/mine/entries',
    summary: 'The ledger of one’s own quota',
    access: everyone,
    scope: 'read',
    response: z.object({ rows: z.array(QuotaEntry) }),
  }),
  listWorkers: endpoint({
    id: 'listWorkers',
    method: 'get',
    path: '/workers',
    summary: 'Worker processes',
    access: everyone,
    scope: 'read',
    response: z.object({ rows: z.array(Worker) }),
  }),
} as const;
