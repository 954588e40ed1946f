import type { endpoints } from '@nightcone/contracts';
import { findQuota, listQuotaEntries as list } from '@nightcone/db';
import type { Handler } from '../../context.ts';

/** The entries of this week's balance, the newest first. An entry moves one side: what it granted, reserved or used. */
export const listQuotaEntries: Handler<typeof endpoints.listQuotaEntries> = async ({ ctx }) => {
  const { db } = ctx.services;
  const balance = await findQuota(db, ctx.caller.account.id);
  const rows = await list(db, balance.id);
  return {
    rows: rows.map(({ id, at, kind, grantedMs, reservedMs, usedMs, reason, submissionId }) => ({
      id,
      at: at.toISOString(),
      kind,
      ms: kind === 'settle' ? usedMs : kind === 'reserve' || kind === 'release' ? reservedMs : grantedMs,
      reason,
      submissionId,
    })),
  };
};
