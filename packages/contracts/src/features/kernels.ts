import { z } from 'zod';
import { endpoint, everyone } from '../endpoint.ts';
import { kernelStates } from '../states.ts';
import { Hash, Instant } from './common.ts';

export const Kernel = z.object({
  digest: Hash,
  version: z.string(),
  state: z.enum(kernelStates),
  bytes: z.int(),
  releasedAt: Instant,
});
export type Kernel = z.infer<typeof Kernel>;

export const kernelsEndpoints = {
  listKernels: endpoint({
    id: 'listKernels',
    method: 'get',
    path: '/kernels',
    summary: 'Kernels that can be run',
    access: 'anyone',
    scope: 'read',
    response: z.object({ rows: z.array(Kernel) }),
  }),
  getKernelModule: endpoint({
    id: 'getKernelModule',
    method: 'get',
    path: '/kernels/:digest/module',
    summary: 'The WebAssembly bytes of a kernel',
    access: 'anyone',
    scope: 'read',
    params: z.object({ digest: Hash }),
  }),
} as const;
export const lookupKinds = ['job', 'result', 'kernel', 'table', 'figure', 'statement'] as const;
export const lookupEndpoints = {
  lookupHash: endpoint({
    id: 'lookupHash',
    method: 'get',
    path: '/lookup/:hash',
    summary: 'What a hash is: full, or its first 12 digits or more',
    access: everyone,
    scope: 'read',
    params: z.object({ hash: z.string().regex(/^[0-9a-f]{12,64}$/, 'at least the first 12 hexadecimal digits') }),
    response: z.object({
      hits: z.array(z.object({ kind: z.enum(lookupKinds), hash: Hash, title: z.string(), path: z.string() })),
    }),
  }),
} as const;
