import type { endpoints } from '@nightcone/contracts';
import { listTokensByAccount } from '@nightcone/db';
import type { Handler } from '../../context.ts';
import { tokenView } from './account-view.ts';

export const listTokens: Handler<typeof endpoints.listTokens> = async ({ ctx }) => {
  const rows = await listTokensByAccount(ctx.services.db, ctx.caller.account.id);
  return { rows: rows.map(tokenView) };
};
