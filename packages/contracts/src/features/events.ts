import { z } from 'zod';
import { endpoint, everyone } from '../endpoint.ts';

/** One message of the event stream: something of that kind changed; the page asks again for what it shows. */
export const ChangeEvent = z.object({
  kind: z.enum(['job', 'submission', 'sweep', 'queue', 'quota', 'session']),
  id: z.string(),
});
export type ChangeEvent = z.infer<typeof ChangeEvent>;

export const eventsEndpoints = {
  streamEvents: endpoint({
    id: 'streamEvents',
    method: 'get',
    path: '/events',
    summary: 'Server-sent events: what has changed',
    access: everyone,
    scope: 'read',
  }),
} as const;

export const systemEndpoints = {
  getHealth: endpoint({
    id: 'getHealth',
    method: 'get',
    path: '/health',
    summary: 'The process answers',
    access: 'anyone',
    scope: 'read',
    response: z.object({ ok: z.literal(true) }),
  }),
  getReady: endpoint({
    id: 'getReady',
    method: 'get',
    path: '/ready',
    summary: 'Database and kernel can be used',
    access: 'anyone',
    scope: 'read',
    response: z.object({ ready: z.boolean(), database: z.boolean(), kernel: z.boolean(), workers: z.int() }),
  }),
} as const;
