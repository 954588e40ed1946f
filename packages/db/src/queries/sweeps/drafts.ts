import { and, count, desc, eq } from 'drizzle-orm';
import type { Db, Queryable } from '../../client.ts';
import { accounts } from '../../schema/accounts.ts';
import { sweepDrafts } from '../../schema/sweeps.ts';

export type DraftRow = typeof sweepDrafts.$inferSelect;
export type DraftContent = Pick<DraftRow, 'title' | 'model' | 'body'>;

const ownDraft = (ownerId: string, id: string) => and(eq(sweepDrafts.id, id), eq(sweepDrafts.ownerId, ownerId));

export async function listDrafts(db: Queryable, ownerId: string): Promise<DraftRow[]> {
  return db.select().from(sweepDrafts).where(eq(sweepDrafts.ownerId, ownerId)).orderBy(desc(sweepDrafts.updatedAt));
}

/** Another person's draft is as unknown as none. */
export async function findOptionalDraft(db: Queryable, ownerId: string, id: string): Promise<DraftRow | undefined> {
  const [row] = await db.select().from(sweepDrafts).where(ownDraft(ownerId, id));
  return row;
}

/** Undefined when the account already keeps `most` drafts. */
export async function saveDraft(
  db: Db,
  ownerId: string,
  draft: DraftContent,
  most: number,
): Promise<DraftRow | undefined> {
  return db.transaction(async (tx) => {
    await tx.select({ id: accounts.id }).from(accounts).where(eq(accounts.id, ownerId)).for('no key update');
    const [kept] = await tx.select({ rows: count() }).from(sweepDrafts).where(eq(sweepDrafts.ownerId, ownerId));
    if ((kept?.rows ?? 0) >= most) return undefined;
    const [row] = await tx
      .insert(sweepDrafts)
      .values({ ownerId, ...draft })
      .returning();
    return row;
  });
}

export async function replaceDraft(
  db: Queryable,
  ownerId: string,
  id: string,
  draft: DraftContent,
): Promise<DraftRow | undefined> {
  const [row] = await db
    .update(sweepDrafts)
    .set({ ...draft, updatedAt: new Date() })
    .where(ownDraft(ownerId, id))
    .returning();
  return row;
}

export async function deleteDraft(db: Queryable, ownerId: string, id: string): Promise<boolean> {
  const rows = await db.delete(sweepDrafts).where(ownDraft(ownerId, id)).returning({ id: sweepDrafts.id });
  return rows.length > 0;
}
