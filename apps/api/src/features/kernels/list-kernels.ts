import type { endpoints } from '@nightcone/contracts';
import { listKernels as list } from '@nightcone/db';
import type { Handler } from '../../context.ts';
import { kernelView } from './kernel-view.ts';

export const listKernels: Handler<typeof endpoints.listKernels> = async ({ ctx }) => ({
  rows: (await list(ctx.services.db)).map(kernelView),
});
