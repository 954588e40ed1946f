import { desc, eq, getTableColumns, sql } from 'drizzle-orm';
import type { Queryable } from '../../client.ts';
import { kernels } from '../../schema/kernels.ts';

const { bytes: _, ...lean } = getTableColumns(kernels);
const listed = { ...lean, size: sql<number>`octet_length(${kernels.bytes})`.mapWith(Number) };
/** A kernel without its module. */
export type KernelRow = Omit<typeof kernels.$inferSelect, 'bytes'> & { size: number };

export async function findOptionalCurrentKernel(db: Queryable): Promise<KernelRow | undefined> {
  const [row] = await db.select(listed).from(kernels).where(eq(kernels.state, 'current'));
  return row;
}

export async function findOptionalKernel(db: Queryable, digest: string): Promise<KernelRow | undefined> {
  const [row] = await db.select(listed).from(kernels).where(eq(kernels.digest, digest));
  return row;
}

/** The WebAssembly module itself. */
export async function findOptionalKernelBytes(db: Queryable, digest: string): Promise<Buffer | undefined> {
  const [row] = await db.select({ bytes: kernels.bytes }).from(kernels).where(eq(kernels.digest, digest));
  return row?.bytes;
}

export async function listKernels(db: Queryable): Promise<KernelRow[]> {
  return db.select(listed).from(kernels).orderBy(desc(kernels.releasedAt));
}
