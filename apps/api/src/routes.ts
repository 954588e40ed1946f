import { type Endpoint, type EndpointId, endpoints } from '@nightcone/contracts';
import type { Handler } from './context.ts';
import { changeAccount } from './features/accounts/change-account.ts';
import { createToken } from './features/accounts/create-token.ts';
import { endAllSessions } from './features/accounts/end-all-sessions.ts';
import { endSession } from './features/accounts/end-session.ts';
import { getSession } from './features/accounts/get-session.ts';
import { listAccounts } from './features/accounts/list-accounts.ts';
import { listSessions } from './features/accounts/list-sessions.ts';
import { listTokens } from './features/accounts/list-tokens.ts';
import { revokeToken } from './features/accounts/revoke-token.ts';
import { updateProfile } from './features/accounts/update-profile.ts';
import { getKernelModule } from './features/kernels/get-kernel-module.ts';
import { listKernels } from './features/kernels/list-kernels.ts';
import { listModels } from './features/models/list-models.ts';
import { getHealth } from './features/workers/get-health.ts';

/** The verb behind every endpoint of the contract, which states path, access and scope. */
const handlers: Partial<{ [Id in EndpointId]: Handler<(typeof endpoints)[Id]> }> = {
  getSession,
  endSession,
  endAllSessions,
  listSessions,
  updateProfile,
  listTokens,
  createToken,
  revokeToken,
  listAccounts,
  changeAccount,
  listKernels,
  getKernelModule,
  listModels,
  getHealth,
};

/** Each endpoint with its handler; the pairing was checked by the type above. */
export const routes = (Object.entries(handlers) as [EndpointId, unknown][]).map(
  ([id, handler]) => [endpoints[id] as Endpoint, handler as Handler<Endpoint>] as const,
);
