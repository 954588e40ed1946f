import { createHash } from 'node:crypto';
import type { endpoints } from '@nightcone/contracts';
import { listSessionsByAccount } from '@nightcone/db';
import type { Handler } from '../../context.ts';

export const listSessions: Handler<typeof endpoints.listSessions> = async ({ ctx }) => {
  const { account, sessionId } = ctx.caller;
  const rows = await listSessionsByAccount(ctx.services.db, account.id);
  return {
    rows: rows
      .map(({ sid, openedAt, agent, seenAt }) => ({
        // The session id is the key to the account: only its digest is shown.
        id: createHash('sha256').update(sid).digest('hex').slice(0, 16),
        current: sid === sessionId,
        createdAt: openedAt ?? seenAt.toISOString(),
        seenAt: seenAt.toISOString(),
        agent: agent ?? '',
      }))
      .toSorted((a, b) => b.seenAt.localeCompare(a.seenAt)),
  };
};
