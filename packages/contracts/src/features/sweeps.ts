import { z } from 'zod';
import { endpoint, everyone, submitters } from '../endpoint.ts';
import { pointStates } from '../states.ts';
import { Expected, Hash, Id, Instant, PageQuery, pageOf, Title, When } from './common.ts';
import { NoteSummary, SpecificationInput } from './models.ts';
import { Submission } from './queue.ts';

type JsonValue = z.infer<ReturnType<typeof z.json>>;

/**
 * One row of JSON values per point. Most are numbers, and there may be 100 000 of them: those are looked at here, what is
 * left goes through the schema, so that a body of 1 MiB is read in milliseconds.
 */
const AxisValues = z
  .array(z.unknown())
  .max(100_000)
  .superRefine((rows, context) => {
    const anyJson = z.json();
    for (const [index, row] of rows.entries()) {
      if (!Array.isArray(row) || row.length < 1 || row.length > 8) {
        const message = 'a row of values is a list of 1 to 8 JSON values';
        context.addIssue({ code: 'custom', path: [index], message });
        return;
      }
      const place = row.findIndex((value) => !Number.isFinite(value) && !anyJson.safeParse(value).success);
      if (place >= 0) {
        context.addIssue({ code: 'custom', path: [index, place], message: 'this is no JSON value' });
        return;
      }
    }
  })
  .transform((rows) => rows as JsonValue[][]);

/** Pointers of one axis vary together. Ranges are exact decimals, made once: `start + i·step` in decimal text. */
export const SweepAxisInput = z.strictObject({
  pointers: z.array(z.string().startsWith('/').max(200)).min(1).max(8),
  /** values[i] has one JSON value per pointer. */
  values: AxisValues.optional(),
  /** Instead of values, for a single pointer: decimal texts. */
  range: z
    .strictObject({ start: z.string().max(40), stop: z.string().max(40), count: z.number().int().min(1) })
    .optional(),
});
export type SweepAxisInput = z.infer<typeof SweepAxisInput>;

export const SweepInput = z.strictObject({
  title: Title,
  specification: SpecificationInput,
  axes: z.array(SweepAxisInput).max(6).default([]),
  when: When.default('now'),
});
export type SweepInput = z.infer<typeof SweepInput>;

export const SweepEstimate = z.object({
  jobs: z.int(),
  alreadyComputed: z.int(),
  cpuMs: z.number(),
  resultBytes: z.number(),
  slices: z.int(),
  notes: z.array(NoteSummary),
  quota: z.object({
    grantedMs: z.number(),
    usedMs: z.number(),
    reservedMs: z.number(),
    afterMs: z.number(),
    fits: z.boolean(),
  }),
  finish: z.object({ now: Expected.nullable(), tonight: Expected.nullable() }),
  first: z.object({ hash: Hash, canonicalText: z.string() }),
});
export type SweepEstimate = z.infer<typeof SweepEstimate>;

export const Sweep = z.object({
  id: Id,
  title: z.string(),
  model: z.string(),
  submission: Submission,
  createdAt: Instant,
  axes: z.array(z.object({ pointers: z.array(z.string()), values: z.array(z.array(z.json())) })),
  specification: z.json(),
  points: z.int(),
  counts: z.record(z.enum(pointStates), z.int()),
});
export type Sweep = z.infer<typeof Sweep>;

export const SweepPoint = z.object({
  /** Place in the grid: row-major over the axes, last axis fastest. */
  index: z.int(),
  values: z.array(z.json()),
  jobHash: Hash,
  state: z.enum(pointStates),
  resultDigest: Hash.nullable(),
  failure: z.object({ code: z.string(), text: z.string() }).nullable(),
  cpuMs: z.number().nullable(),
});
export type SweepPoint = z.infer<typeof SweepPoint>;

export const Draft = z.object({ id: Id, title: z.string(), model: z.string(), body: z.json(), updatedAt: Instant });
export type Draft = z.infer<typeof Draft>;
const DraftBody = z.strictObject({ title: Title, model: z.string().max(60), body: z.json() });

export const sweepsEndpoints = {
  estimateSweep: endpoint({
    id: 'estimateSweep',
    method: 'post',
    path: '/sweeps/estimate',
    summary: 'Dry run: count, cost, finish and validity of every point',
    access: everyone,
    scope: 'read',
    body: SweepInput,
    response: SweepEstimate,
  }),
  submitSweep: endpoint({
    id: 'submitSweep',
    method: 'post',
    path: '/sweeps',
    summary: 'Submit a sweep',
    access: submitters,
    scope: 'submit',
    status: 201,
    body: SweepInput,
    response: z.object({ sweepId: Id, submissionId: Id, jobs: z.int(), alreadyComputed: z.int() }),
  }),
  listSweeps: endpoint({
    id: 'listSweeps',
    method: 'get',
    path: '/sweeps',
    summary: 'One’s own sweeps',
    access: everyone,
    scope: 'read',
    query: PageQuery,
    response: pageOf(Sweep.omit({ axes: true, specification: true })),
  }),
  getSweep: endpoint({
    id: 'getSweep',
    method: 'get',
    path: '/sweeps/:id',
    summary: 'One sweep',
    access: everyone,
    scope: 'read',
    params: z.object({ id: Id }),
    response: Sweep,
  }),
  listSweepPoints: endpoint({
    id: 'listSweepPoints',
    method: 'get',
    path: '/sweeps/:id/points',
    summary: 'All points with their states',
    access: everyone,
    scope: 'read',
    params: z.object({ id: Id }),
    response: z.object({ rows: z.array(SweepPoint) }),
  }),
  getSweepQuantity: endpoint({
    id: 'getSweepQuantity',
    method: 'get',
    path: '/sweeps/:id/quantities',
    summary: 'Numbers of one array for every finished point; of a ragged or long array, one row',
    access: everyone,
    scope: 'read',
    params: z.object({ id: Id }),
    query: z.object({ array: z.string().max(80), row: z.coerce.number().int().min(0).optional() }),
    response: z.object({
      array: z.string(),
      unit: z.string(),
      rows: z.array(z.object({ index: z.int(), values: z.array(z.number()) })),
    }),
  }),
  retryFailed: endpoint({
    id: 'retryFailed',
    method: 'post',
    path: '/sweeps/:id/retry-failed',
    summary: 'Put broken-off points back into the backlog',
    access: submitters,
    scope: 'submit',
    params: z.object({ id: Id }),
    response: z.object({ points: z.int() }),
  }),
  listDrafts: endpoint({
    id: 'listDrafts',
    method: 'get',
    path: '/drafts',
    summary: 'One’s own drafts',
    access: submitters,
    scope: 'read',
    response: z.object({ rows: z.array(Draft) }),
  }),
  getDraft: endpoint({
    id: 'getDraft',
    method: 'get',
    path: '/drafts/:id',
    summary: 'One draft',
    access: submitters,
    scope: 'read',
    params: z.object({ id: Id }),
    response: Draft,
  }),
  createDraft: endpoint({
    id: 'createDraft',
    method: 'post',
    path: '/drafts',
    summary: 'Keep a draft',
    access: submitters,
    scope: 'submit',
    status: 201,
    body: DraftBody,
    response: Draft,
  }),
  updateDraft: endpoint({
    id: 'updateDraft',
    method: 'put',
    path: '/drafts/:id',
    summary: 'Keep a newer draft',
    access: submitters,
    scope: 'submit',
    params: z.object({ id: Id }),
    body: DraftBody,
    response: Draft,
  }),
  deleteDraft: endpoint({
    id: 'deleteDraft',
    method: 'delete',
    path: '/drafts/:id',
    summary: 'Drop a draft',
    access: submitters,
    scope: 'submit',
    params: z.object({ id: Id }),
    status: 204,
  }),
} as const;
