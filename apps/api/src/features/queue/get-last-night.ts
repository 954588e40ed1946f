import { type endpoints, lastNight } from '@nightcone/contracts';
import { findNightQuality, findNightUse, findSettings, listNightFailures, listNightRows } from '@nightcone/db';
import type { Handler } from '../../context.ts';

/** What happened to one's own work between the beginning of the last night that is over, and its end. */
export const getLastNight: Handler<typeof endpoints.getLastNight> = async ({ ctx }) => {
  const { db } = ctx.services;
  const me = ctx.caller.account.id;
  const { from, to } = lastNight(new Date(), await findSettings(db));
  const [rows, quality, failures, use] = await Promise.all([
    listNightRows(db, me, from, to),
    findNightQuality(db, me, from, to),
    listNightFailures(db, me, from, to),
    findNightUse(db, me, from, to),
  ]);
  const sum = (count: (row: (typeof rows)[number]) => number) => rows.reduce((total, row) => total + count(row), 0);
  return {
    from: from.toISOString(),
    to: to.toISOString(),
    sweeps: rows.filter(({ sweepId }) => sweepId !== null).length,
    finished: sum(({ finished }) => finished),
    failed: sum(({ failed }) => failed),
    usedMs: use.usedMs,
    returnedMs: use.returnedMs,
    largestResidualEv: quality.largestResidual,
    checksHeld: quality.checksHeld,
    checksMade: quality.checksMade,
    failures,
    rows: rows.map(({ submissionId: _, ...row }) => row),
  };
};
