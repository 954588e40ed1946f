import { asc, eq } from 'drizzle-orm';
import type { Queryable } from '../client.ts';
import { auditEntries } from '../schema/audit.ts';

/** Who does it, and in which request: what every change of state is told along with. */
export interface Actor {
  accountId: string | null;
  requestId: string | null;
}

export interface AuditEntry {
  /** feature.verb */
  action: string;
  subject: string;
  subjectId: string;
  before?: unknown;
  after?: unknown;
}

/** Appends an entry; call it in the transaction of the change. */
export async function saveAuditEntry(db: Queryable, actor: Actor, entry: AuditEntry): Promise<void> {
  await db.insert(auditEntries).values({ actorId: actor.accountId, requestId: actor.requestId, ...entry });
}

export type AuditRow = typeof auditEntries.$inferSelect;

/** Everything that was done to one thing, the oldest first. */
export async function listAuditEntries(db: Queryable, subjectId: string): Promise<AuditRow[]> {
  return db.select().from(auditEntries).where(eq(auditEntries.subjectId, subjectId)).orderBy(asc(auditEntries.id));
}
