import type { endpoints } from '@nightcone/contracts';
import { findQuota, findTurnLimits, listQuotaUse } from '@nightcone/db';
import type { Handler } from '../../context.ts';

export const getQuota: Handler<typeof endpoints.getQuota> = async ({ ctx }) => {
  const { db } = ctx.services;
  const me = ctx.caller.account.id;
  const [balance, { maxSlots }] = await Promise.all([findQuota(db, me), findTurnLimits(db, me)]);
  const use = await listQuotaUse(db, balance.id);
  return {
    weekStart: balance.weekStart.toISOString(),
    weekEnd: balance.weekEnd.toISOString(),
    grantedMs: balance.grantedMs,
    reservedMs: balance.reservedMs,
    usedMs: balance.usedMs,
    maxSlots,
    line: use.map(({ at, usedMs }) => ({ at: at.toISOString(), usedMs })),
  };
};
