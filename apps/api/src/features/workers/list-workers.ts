import type { endpoints } from '@nightcone/contracts';
import { listWorkers as list } from '@nightcone/db';
import type { Handler } from '../../context.ts';

export const listWorkers: Handler<typeof endpoints.listWorkers> = async ({ ctx }) => ({
  rows: (await list(ctx.services.db)).map((row) => ({
    id: row.id,
    host: row.host,
    slots: row.slots,
    busy: row.busy,
    state: row.state,
    heartbeatAt: row.heartbeatAt.toISOString(),
    startedAt: row.startedAt.toISOString(),
    speedFactor: row.speedFactor,
  })),
});
