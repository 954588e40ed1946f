import { accountsEndpoints } from './features/accounts.ts';
import { eventsEndpoints, systemEndpoints } from './features/events.ts';
import { jobsEndpoints } from './features/jobs.ts';
import { kernelsEndpoints, lookupEndpoints } from './features/kernels.ts';
import { modelsEndpoints } from './features/models.ts';
import { queueEndpoints } from './features/queue.ts';
import { sweepsEndpoints } from './features/sweeps.ts';

/** Every endpoint below /api/v1 by its id. */
export const endpoints = {
  ...accountsEndpoints,
  ...modelsEndpoints,
  ...jobsEndpoints,
  ...sweepsEndpoints,
  ...queueEndpoints,
  ...kernelsEndpoints,
  ...lookupEndpoints,
  ...eventsEndpoints,
  ...systemEndpoints,
} as const;
export type EndpointId = keyof typeof endpoints;
