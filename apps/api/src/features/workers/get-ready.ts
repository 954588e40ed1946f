import type { endpoints } from '@nightcone/contracts';
import { findCapacity, findOptionalCurrentKernel } from '@nightcone/db';
import type { Handler } from '../../context.ts';

/** Whether database and kernel can be used, and how many workers take work. */
export const getReady: Handler<typeof endpoints.getReady> = async ({ ctx }) => {
  const { db, logger } = ctx.services;
  try {
    const [kernel, { workers }] = await Promise.all([findOptionalCurrentKernel(db), findCapacity(db)]);
    return { ready: kernel !== undefined, database: true, kernel: kernel !== undefined, workers };
  } catch (error) {
    logger.warn({ reason: error instanceof Error ? error.message : 'unknown' }, 'not ready');
    return { ready: false, database: false, kernel: false, workers: 0 };
  }
};
