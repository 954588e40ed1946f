import { type Db, findOptionalCurrentKernel, findOptionalKernel, type KernelRow } from '@nightcone/db';
import type { KernelManifest } from '@nightcone/models';
import { Refusal } from '../refusal.ts';

export interface PlanningKernel {
  digest: string;
  manifest: KernelManifest;
  current: boolean;
}

/** The kernel that a specification names, or the current one. */
export async function findPlanningKernel(db: Db, digest: string | undefined): Promise<PlanningKernel> {
  const row: KernelRow | undefined =
    digest === undefined ? await findOptionalCurrentKernel(db) : await findOptionalKernel(db, digest);
  if (row) return { digest: row.digest, manifest: row.manifest as KernelManifest, current: row.state === 'current' };
  if (digest === undefined) throw new Refusal('unavailable', 'No kernel has been released here yet.');
  const message = `No kernel with the digest ${digest.slice(0, 12)}… is known here.`;
  throw new Refusal('unknown-kernel', message, {
    errors: [{ field: '/specification/kernel', message, value: digest, limit: 'a kernel listed at /api/v1/kernels' }],
  });
}
