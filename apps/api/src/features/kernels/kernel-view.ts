import type { Kernel } from '@nightcone/contracts';
import type { KernelRow } from '@nightcone/db';

export const kernelView = (row: KernelRow): Kernel => ({
  digest: row.digest,
  version: row.version,
  state: row.state,
  bytes: row.size,
  releasedAt: row.releasedAt.toISOString(),
});
