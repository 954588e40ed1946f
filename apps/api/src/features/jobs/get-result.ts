import type { endpoints } from '@nightcone/contracts';
import { findOptionalResult } from '@nightcone/db';
import type { Handler } from '../../context.ts';
import { notFound } from '../../refusal.ts';

export const getResult: Handler<typeof endpoints.getResult> = async ({ ctx, input }) => {
  const row = await findOptionalResult(ctx.services.db, input.params.digest, ctx.caller.account.id);
  if (!row) throw notFound('result');
  return { digest: row.digest, arrays: row.arrays, certificate: row.certificate };
};
