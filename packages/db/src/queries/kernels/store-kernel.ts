import { eq, sql } from 'drizzle-orm';
import type { Db } from '../../client.ts';
import { kernels } from '../../schema/kernels.ts';
import { saveAuditEntry } from '../audit.ts';

export interface NewKernel {
  digest: string;
  version: string;
  bytes: Uint8Array;
  manifest: unknown;
  /** Takes the place of the current one, which stays runnable. */
  current: boolean;
}

/** Stores a kernel, once. What is stored under a digest is never changed; only which one is current. */
export function storeKernel(db: Db, { digest, version, bytes, manifest, current }: NewKernel): Promise<void> {
  return db.transaction(async (tx) => {
    await tx.execute(sql`lock table kernels in share row exclusive mode`);
    const [stored] = await tx.select({ state: kernels.state }).from(kernels).where(eq(kernels.digest, digest));
    if (!stored) await tx.insert(kernels).values({ digest, version, bytes: Buffer.from(bytes), manifest });
    if (!current || stored?.state === 'current') return;
    await tx.update(kernels).set({ state: 'released' }).where(eq(kernels.state, 'current'));
    await tx.update(kernels).set({ state: 'current' }).where(eq(kernels.digest, digest));
    await saveAuditEntry(
      tx,
      { accountId: null, requestId: null },
      { action: 'kernels.release', subject: 'kernel', subjectId: digest, after: { version } },
    );
  });
}
