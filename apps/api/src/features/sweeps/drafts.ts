import { type Draft, type endpoints, limits } from '@nightcone/contracts';
import {
  type DraftRow,
  findOptionalDraft,
  listDrafts as list,
  deleteDraft as remove,
  replaceDraft,
  saveDraft,
} from '@nightcone/db';
import type { Handler } from '../../context.ts';
import { notFound, Refusal } from '../../refusal.ts';

const draftView = (row: DraftRow): Draft => ({
  id: row.id,
  title: row.title,
  model: row.model,
  body: row.body as Draft['body'],
  updatedAt: row.updatedAt.toISOString(),
});

export const listDrafts: Handler<typeof endpoints.listDrafts> = async ({ ctx }) => ({
  rows: (await list(ctx.services.db, ctx.caller.account.id)).map(draftView),
});

export const getDraft: Handler<typeof endpoints.getDraft> = async ({ ctx, input }) => {
  const row = await findOptionalDraft(ctx.services.db, ctx.caller.account.id, input.params.id);
  if (!row) throw notFound('draft');
  return draftView(row);
};

export const createDraft: Handler<typeof endpoints.createDraft> = async ({ ctx, input }) => {
  const row = await saveDraft(ctx.services.db, ctx.caller.account.id, input.body, limits.draftsPerAccount);
  if (!row) throw new Refusal('conflict', `At most ${limits.draftsPerAccount} drafts are kept; drop one first.`);
  return draftView(row);
};

export const updateDraft: Handler<typeof endpoints.updateDraft> = async ({ ctx, input }) => {
  const row = await replaceDraft(ctx.services.db, ctx.caller.account.id, input.params.id, input.body);
  if (!row) throw notFound('draft');
  return draftView(row);
};

export const deleteDraft: Handler<typeof endpoints.deleteDraft> = async ({ ctx, input }) => {
  if (!(await remove(ctx.services.db, ctx.caller.account.id, input.params.id))) throw notFound('draft');
};
