import { desc } from 'drizzle-orm';
import type { Db, Queryable } from '../../client.ts';
import { settings } from '../../schema/queue/settings.ts';
import { type Actor, saveAuditEntry } from '../audit.ts';

export type SettingsRow = typeof settings.$inferSelect;
export type SettingsChange = Partial<Omit<SettingsRow, 'version' | 'changedBy' | 'createdAt'>>;

/** The group's settings: the newest version. The migrations fill in the first. */
export async function findSettings(db: Queryable): Promise<SettingsRow> {
  const [row] = await db.select().from(settings).orderBy(desc(settings.version)).limit(1);
  if (!row) throw new Error('the settings have no first version: migrations are missing');
  return row;
}

/** Adds a version; what is not changed is taken from the one before. */
export async function saveSettings(db: Db, actor: Actor, change: SettingsChange): Promise<SettingsRow> {
  return db.transaction(async (tx) => {
    const [before] = await tx.select().from(settings).orderBy(desc(settings.version)).limit(1);
    const { version: _, changedBy: _by, createdAt: _at, ...kept } = before ?? { groupName: '' };
    const values = { ...kept, ...change, changedBy: actor.accountId };
    const [after] = await tx.insert(settings).values(values).returning();
    const row = after as SettingsRow;
    const entry = {
      action: 'queue.change-settings',
      subject: 'settings',
      subjectId: String(row.version),
      before,
      after,
    };
    await saveAuditEntry(tx, actor, entry);
    return row;
  });
}
