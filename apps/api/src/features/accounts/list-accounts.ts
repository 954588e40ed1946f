import type { endpoints } from '@nightcone/contracts';
import { listAccounts as list } from '@nightcone/db';
import type { Handler } from '../../context.ts';
import { instantCursor, nextCursor } from '../../page-cursor.ts';
import { accountView } from './account-view.ts';

export const listAccounts: Handler<typeof endpoints.listAccounts> = async ({ ctx, input }) => {
  const { state, limit, cursor } = input.query;
  const [createdAt, id] = instantCursor(cursor) ?? [];
  const after = createdAt && id ? { createdAt, id } : undefined;
  const { rows, total } = await list(ctx.services.db, { state, limit: limit + 1, after });
  const page = rows.slice(0, limit);
  return {
    rows: page.map(accountView),
    total,
    nextCursor: nextCursor(rows.length > limit ? page.at(-1) : undefined, (row) => [row.createdAt, row.id]),
  };
};
