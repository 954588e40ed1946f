import { z } from 'zod';
import { endpoint } from '../endpoint.ts';
import { Hash } from './common.ts';

/** A validity note that applies to some points of a question. */
export const NoteSummary = z.object({
  code: z.string(),
  severity: z.enum(['note', 'caution', 'refuse']),
  field: z.string(),
  unit: z.string(),
  limit: z.number(),
  /** The value furthest beyond the limit. */
  worst: z.number(),
  /** How many points carry it, and the first of them. */
  points: z.int(),
  firstPoints: z.array(z.int()),
});
export type NoteSummary = z.infer<typeof NoteSummary>;

/**
 * A specification as people send it: defaults may be left out, `kernel` too (then the current one).
 * The whole check against the kernel's manifest happens behind it.
 */
export const SpecificationInput = z.strictObject({
  schema: z.literal('nightcone.job/1').default('nightcone.job/1'),
  model: z.string().max(60),
  parameters: z.record(z.string(), z.json()).default({}),
  numerics: z.record(z.string(), z.json()).default({}),
  tables: z.array(Hash).max(64).optional(),
  kernel: Hash.optional(),
});
export type SpecificationInput = z.infer<typeof SpecificationInput>;

export const modelsEndpoints = {
  listModels: endpoint({
    id: 'listModels',
    method: 'get',
    path: '/models',
    summary: 'Models of the current kernel: its manifest',
    access: 'anyone',
    scope: 'read',
    response: z.object({ kernel: Hash, version: z.string(), models: z.array(z.json()) }),
  }),
} as const;
