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
import { streamEvents } from './features/events/stream-events.ts';
import { exportJob } from './features/jobs/export-job.ts';
import { getExecution } from './features/jobs/get-execution.ts';
import { getJob } from './features/jobs/get-job.ts';
import { getResult } from './features/jobs/get-result.ts';
import { getResultArray } from './features/jobs/get-result-array.ts';
import { listJobs } from './features/jobs/list-jobs.ts';
import { rerunJob } from './features/jobs/rerun-job.ts';
import { submitJob } from './features/jobs/submit-job.ts';
import { getKernelModule } from './features/kernels/get-kernel-module.ts';
import { listKernels } from './features/kernels/list-kernels.ts';
import { lookupHash } from './features/lookup/lookup-hash.ts';
import { listModels } from './features/models/list-models.ts';
import { cancelSubmission, pauseSubmission, resumeSubmission } from './features/queue/control-submission.ts';
import { getLastNight } from './features/queue/get-last-night.ts';
import { getNight } from './features/queue/get-night.ts';
import { getSubmission } from './features/queue/get-submission.ts';
import { listSubmissions } from './features/queue/list-submissions.ts';
import { getQuota } from './features/quotas/get-quota.ts';
import { listQuotaEntries } from './features/quotas/list-quota-entries.ts';
import { createDraft, deleteDraft, getDraft, listDrafts, updateDraft } from './features/sweeps/drafts.ts';
import { estimateSweep } from './features/sweeps/estimate-sweep.ts';
import { getSweep } from './features/sweeps/get-sweep.ts';
import { getSweepQuantity } from './features/sweeps/get-sweep-quantity.ts';
import { listSweepPoints } from './features/sweeps/list-sweep-points.ts';
import { listSweeps } from './features/sweeps/list-sweeps.ts';
import { retryFailed } from './features/sweeps/retry-failed.ts';
import { submitSweep } from './features/sweeps/submit-sweep.ts';
import { getHealth } from './features/workers/get-health.ts';
import { getReady } from './features/workers/get-ready.ts';
import { listWorkers } from './features/workers/list-workers.ts';

/** The verb behind every endpoint of the contract, which states path, access and scope. One that lacks its verb does not compile. */
const handlers: { [Id in EndpointId]: Handler<(typeof endpoints)[Id]> } = {
  changeAccount,
  createToken,
  endAllSessions,
  endSession,
  getSession,
  listAccounts,
  listSessions,
  listTokens,
  revokeToken,
  updateProfile,
  listModels,
  listJobs,
  submitJob,
  getJob,
  rerunJob,
  exportJob,
  getExecution,
  getResult,
  getResultArray,
  estimateSweep,
  submitSweep,
  listSweeps,
  getSweep,
  listSweepPoints,
  getSweepQuantity,
  retryFailed,
  listDrafts,
  getDraft,
  createDraft,
  updateDraft,
  deleteDraft,
  getNight,
  getLastNight,
  listSubmissions,
  getSubmission,
  pauseSubmission,
  resumeSubmission,
  cancelSubmission,
  getQuota,
  listQuotaEntries,
  listWorkers,
  getHealth,
  getReady,
  listKernels,
  getKernelModule,
  lookupHash,
  streamEvents,
};

/** Each endpoint with its handler; the pairing was checked by the type above. */
export const routes = (Object.entries(handlers) as [EndpointId, unknown][]).map(
  ([id, handler]) => [endpoints[id] as Endpoint, handler as Handler<Endpoint>] as const,
);
