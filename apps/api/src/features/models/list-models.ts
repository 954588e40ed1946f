import type { endpoints } from '@nightcone/contracts';
import { findOptionalCurrentKernel } from '@nightcone/db';
import type { KernelManifest } from '@nightcone/models';
import type { Handler } from '../../context.ts';
import { Refusal } from '../../refusal.ts';

export const listModels: Handler<typeof endpoints.listModels> = async ({ ctx }) => {
  const kernel = await findOptionalCurrentKernel(ctx.services.db);
  if (!kernel) throw new Refusal('unavailable', 'No kernel has been released here yet.');
  const { models } = kernel.manifest as KernelManifest;
  return { kernel: kernel.digest, version: kernel.version, models: models as never[] };
};
