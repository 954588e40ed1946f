import { z } from 'zod';
import { endpoint, everyone, submitters } from '../endpoint.ts';
import { executionStates, jobStates } from '../states.ts';
import { Hash, Id, Instant, PageQuery, Person, pageOf, Title, When } from './common.ts';
import { NoteSummary, SpecificationInput } from './models.ts';
import { Progress } from './queue.ts';

export const Check = z.object({
  code: z.string(),
  computed: z.number(),
  expected: z.number(),
  tolerance: z.number(),
  holds: z.boolean(),
});
/** Numbers by name in the kernel's order, and the checks that applied. */
export const Certificate = z.object({ numbers: z.record(z.string(), z.number()), checks: z.array(Check) });
export type Certificate = z.infer<typeof Certificate>;

/** One array of a result without its bytes. Ragged arrays name the i32 array that holds their offsets. */
export const ArrayInfo = z.object({
  name: z.string(),
  dtype: z.enum(['f64', 'i32', 'u8']),
  shape: z.array(z.int()),
  dims: z.array(z.string()),
  unit: z.string(),
  ragged: z.string().optional(),
  sha256: Hash,
  bytes: z.int(),
});
export type ArrayInfo = z.infer<typeof ArrayInfo>;

export const JobSummary = z.object({
  hash: Hash,
  model: z.string(),
  title: z.string(),
  state: z.enum(jobStates),
  kernel: Hash,
  resultDigest: Hash.nullable(),
  /** A check of the certificate does not hold. */
  checkFailed: z.boolean(),
  cpuMs: z.number().nullable(),
  askedBy: Person,
  mine: z.boolean(),
  createdAt: Instant,
  finishedAt: Instant.nullable(),
});
export type JobSummary = z.infer<typeof JobSummary>;

export const Execution = z.object({
  id: Id,
  reason: z.enum(['first', 're-run', 'audit', 'restore']),
  state: z.enum(executionStates),
  askedBy: Person,
  startedAt: Instant.nullable(),
  finishedAt: Instant.nullable(),
  cpuMs: z.number(),
  workers: z.array(z.string()),
  resultDigest: Hash.nullable(),
  /** Against the job's first result: 'first', 'identical', 'different'; null while there is none. */
  bits: z.enum(['first', 'identical', 'different']).nullable(),
  progress: Progress,
  failure: z.object({ code: z.string(), text: z.string() }).nullable(),
  log: z.array(z.object({ at: Instant, text: z.string() })),
});
export type Execution = z.infer<typeof Execution>;

export const JobView = JobSummary.extend({
  specification: z.json(),
  canonicalText: z.string(),
  notes: z.array(NoteSummary),
  estimate: z.object({ cpuMs: z.number(), resultBytes: z.number(), slices: z.int() }),
  certificate: Certificate.nullable(),
  arrays: z.array(ArrayInfo),
  executions: z.array(Execution),
  failure: z.object({ code: z.string(), text: z.string() }).nullable(),
  sweeps: z.array(z.object({ id: Id, title: z.string() })),
});
export type JobView = z.infer<typeof JobView>;

export const jobsEndpoints = {
  listJobs: endpoint({
    id: 'listJobs',
    method: 'get',
    path: '/jobs',
    summary: 'Jobs',
    access: everyone,
    scope: 'read',
    query: PageQuery.extend({
      sort: z.enum(['createdAt', 'finishedAt', 'cpuMs', 'model']).default('createdAt'),
      direction: z.enum(['ascending', 'descending']).default('descending'),
      model: z.string().max(60).optional(),
      state: z.enum(jobStates).optional(),
      mine: z.enum(['true', 'false']).optional(),
      text: z.string().max(100).optional(),
    }),
    response: pageOf(JobSummary),
  }),
  submitJob: endpoint({
    id: 'submitJob',
    method: 'post',
    path: '/jobs',
    summary: 'Submit one job',
    access: submitters,
    scope: 'submit',
    status: 201,
    body: z.strictObject({ title: Title.optional(), specification: SpecificationInput, when: When.default('now') }),
    response: z.object({ hash: Hash, submissionId: Id.nullable(), alreadyComputed: z.boolean() }),
  }),
  getJob: endpoint({
    id: 'getJob',
    method: 'get',
    path: '/jobs/:hash',
    summary: 'One job',
    access: everyone,
    scope: 'read',
    params: z.object({ hash: Hash }),
    response: JobView,
  }),
  rerunJob: endpoint({
    id: 'rerunJob',
    method: 'post',
    path: '/jobs/:hash/executions',
    summary: 'Re-run on the queue and compare the bits',
    access: everyone,
    scope: 'submit',
    status: 201,
    params: z.object({ hash: Hash }),
    response: z.object({ executionId: Id, submissionId: Id }),
  }),
  exportJob: endpoint({
    id: 'exportJob',
    method: 'get',
    path: '/jobs/:hash/export',
    summary: 'The result as a file',
    access: everyone,
    scope: 'read',
    params: z.object({ hash: Hash }),
    query: z.object({ format: z.enum(['json', 'csv', 'npz']) }),
  }),
  getExecution: endpoint({
    id: 'getExecution',
    method: 'get',
    path: '/executions/:id',
    summary: 'Progress and log of one execution',
    access: everyone,
    scope: 'read',
    params: z.object({ id: Id }),
    response: Execution,
  }),
  getResult: endpoint({
    id: 'getResult',
    method: 'get',
    path: '/results/:digest',
    summary: 'Arrays and certificate of a result',
    access: everyone,
    scope: 'read',
    params: z.object({ digest: Hash }),
    response: z.object({ digest: Hash, arrays: z.array(ArrayInfo), certificate: Certificate }),
  }),
  getResultArray: endpoint({
    id: 'getResultArray',
    method: 'get',
    path: '/results/:digest/arrays/:name',
    summary: 'Raw little-endian bytes of one array, or .npy',
    access: everyone,
    scope: 'read',
    params: z.object({ digest: Hash, name: z.string().max(80) }),
    query: z.object({ format: z.enum(['raw', 'npy']).default('raw') }),
  }),
} as const;
