import { type AccountState, accountArrows, type Role } from '@nightcone/contracts';
import { and, asc, count, eq, isNull, or, sql } from 'drizzle-orm';
import type { Db, Queryable } from '../../client.ts';
import { accessTokens, accounts } from '../../schema/accounts.ts';
import { type Actor, saveAuditEntry } from '../audit.ts';
import { deleteSessionsOfAccount } from './sessions.ts';

export type AccountRow = typeof accounts.$inferSelect;

export interface SignedInPerson {
  providerId: string;
  login: string;
  name: string;
  email: string | null;
}

/**
 * The account behind a provider id, made on the first sign-in. Login and e-mail follow the provider; the name is the
 * person's own after that. The first admin of the configuration is admitted as admin whenever he signs in.
 */
export async function saveSignedInAccount(
  db: Db,
  person: SignedInPerson,
  firstAdmin: string | undefined,
  requestId: string | null,
): Promise<AccountRow> {
  return db.transaction(async (tx) => {
    const { providerId, login, name, email } = person;
    const [known] = await tx.select().from(accounts).where(eq(accounts.providerId, providerId)).for('no key update');
    if (known === undefined || providerId === firstAdmin) {
      const admitted =
        providerId === firstAdmin ? { role: 'admin' as const, state: 'active' as const, admittedAt: new Date() } : {};
      const [row] = await tx
        .insert(accounts)
        .values({ providerId, login, name, email, ...admitted })
        .onConflictDoUpdate({ target: accounts.providerId, set: { login, email, ...admitted } })
        .returning();
      const account = row as AccountRow;
      if (known?.state !== account.state || known.role !== account.role) {
        const after = { state: account.state, role: account.role };
        const before = known && { state: known.state, role: known.role };
        const entry = { action: 'accounts.sign-in', subject: 'account', subjectId: account.id, before, after };
        await saveAuditEntry(tx, { accountId: account.id, requestId }, entry);
      }
      return account;
    }
    const [row] = await tx.update(accounts).set({ login, email }).where(eq(accounts.id, known.id)).returning();
    return row as AccountRow;
  });
}

export async function findOptionalAccount(db: Queryable, id: string): Promise<AccountRow | undefined> {
  const [row] = await db.select().from(accounts).where(eq(accounts.id, id));
  return row;
}

export interface AccountPage {
  state?: AccountState;
  limit: number;
  /** Last row of the page before. */
  after?: { createdAt: Date; id: string };
}

/** Callers know instants to the millisecond: what is compared with theirs is cut to that. */
const createdMs = sql`date_trunc('milliseconds', ${accounts.createdAt})`;

/** People in the order of their first sign-in. */
export async function listAccounts(db: Queryable, { state, limit, after }: AccountPage) {
  const wanted = state && eq(accounts.state, state);
  const beyond =
    after && sql`(${createdMs}, ${accounts.id}) > (${after.createdAt.toISOString()}::timestamptz, ${after.id}::uuid)`;
  const [rows, [total]] = await Promise.all([
    db.select().from(accounts).where(and(wanted, beyond)).orderBy(createdMs, accounts.id).limit(limit),
    db.select({ rows: count() }).from(accounts).where(wanted),
  ]);
  return { rows, total: total?.rows ?? 0 };
}

export async function saveProfile(db: Queryable, id: string, profile: { name?: string; timeZone?: string }) {
  const [row] = await db
    .update(accounts)
    .set({ ...profile, id })
    .where(eq(accounts.id, id))
    .returning();
  return row;
}

export type AccountChange = { state?: 'active' | 'deactivated'; role?: Role };
export type ChangedAccount =
  | { outcome: 'changed'; account: AccountRow }
  | { outcome: 'unknown' }
  | { outcome: 'no-arrow'; state: AccountState }
  /** Nobody would be left who can admit people. */
  | { outcome: 'last-admin' };

/** Admits, deactivates or gives another role, along the arrows of an account. Deactivating ends sessions and tokens. */
export async function changeAccount(db: Db, actor: Actor, id: string, change: AccountChange): Promise<ChangedAccount> {
  return db.transaction(async (tx): Promise<ChangedAccount> => {
    // All admins are locked, so that two admins cannot each deactivate the other.
    const locked = await tx
      .select()
      .from(accounts)
      .where(or(eq(accounts.id, id), eq(accounts.role, 'admin')))
      .orderBy(accounts.id)
      .for('no key update');
    const before = locked.find((row) => row.id === id);
    if (!before) return { outcome: 'unknown' };
    const state = change.state ?? before.state;
    const role = change.role ?? before.role;
    const arrows: readonly AccountState[] = accountArrows[before.state];
    if (state !== before.state && !arrows.includes(state)) return { outcome: 'no-arrow', state: before.state };
    const otherAdmin = locked.some((row) => row.id !== id && row.role === 'admin' && row.state === 'active');
    if (!otherAdmin && !(role === 'admin' && state === 'active')) return { outcome: 'last-admin' };
    const admittedAt = before.admittedAt ?? (state === 'active' ? new Date() : null);
    const [after] = await tx.update(accounts).set({ state, role, admittedAt }).where(eq(accounts.id, id)).returning();
    if (state === 'deactivated') {
      await deleteSessionsOfAccount(tx, id);
      await tx
        .update(accessTokens)
        .set({ revokedAt: new Date() })
        .where(and(eq(accessTokens.accountId, id), isNull(accessTokens.revokedAt)));
    }
    if (state !== before.state || role !== before.role)
      await saveAuditEntry(tx, actor, {
        action: 'accounts.change',
        subject: 'account',
        subjectId: id,
        before: { state: before.state, role: before.role },
        after: { state, role },
      });
    return { outcome: 'changed', account: after as AccountRow };
  });
}

/** Everybody in the order of arrival, for the labels of people. */
export async function listPeople(db: Queryable) {
  const { id, name, role } = accounts;
  return db.select({ id, name, role }).from(accounts).orderBy(asc(accounts.createdAt), asc(accounts.id));
}

export interface DemoPerson {
  providerId: number | string;
  login: string;
  name: string;
  role: Role;
}

/** Makes and admits accounts before anybody has signed in: the people of a demo. Repeatable; says so in the audit. */
export async function admitDemoAccounts(db: Db, people: readonly DemoPerson[]): Promise<void> {
  await db.transaction(async (tx) => {
    for (const { providerId, login, name, role } of people) {
      const values = {
        providerId: String(providerId),
        login,
        name,
        role,
        state: 'active' as const,
        admittedAt: new Date(),
      };
      const [row] = await tx.insert(accounts).values(values).onConflictDoNothing().returning();
      if (!row) continue;
      const entry = { action: 'accounts.admit-demo', subject: 'account', subjectId: row.id, after: { role } };
      await saveAuditEntry(tx, { accountId: null, requestId: null }, entry);
    }
  });
}
