import type { endpoints } from '@nightcone/contracts';
import { findOptionalKernelBytes } from '@nightcone/db';
import type { Handler } from '../../context.ts';
import { notFound } from '../../refusal.ts';

/** The module under its digest never changes: a cache may keep it for ever. */
export const getKernelModule: Handler<typeof endpoints.getKernelModule> = async ({ ctx, input }) => {
  const { digest } = input.params;
  const bytes = await findOptionalKernelBytes(ctx.services.db, digest);
  if (!bytes) throw notFound('kernel');
  return {
    type: 'application/wasm',
    bytes: bytes.length,
    etag: digest,
    cache: 'public, max-age=31536000, immutable',
    chunks: [bytes],
  };
};
