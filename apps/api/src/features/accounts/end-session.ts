import type { endpoints } from '@nightcone/contracts';
import { deleteSession, revokeToken } from '@nightcone/db';
import type { Handler } from '../../context.ts';

/** Signs out here: this session of a browser, or this token of a script. */
export const endSession: Handler<typeof endpoints.endSession> = async ({ ctx }) => {
  const { account, sessionId, tokenId } = ctx.caller;
  const { db } = ctx.services;
  if (sessionId !== undefined) await deleteSession(db, account.id, sessionId);
  if (tokenId !== undefined)
    await revokeToken(db, { accountId: account.id, requestId: ctx.requestId }, account.id, tokenId);
};
