import { and, eq, gt, sql } from 'drizzle-orm';
import type { Db, Queryable } from '../../client.ts';
import { accessTokens, accounts, sessions } from '../../schema/accounts.ts';
import { channel } from '../events/listen.ts';
import { usable } from './tokens.ts';

/** The account id that the sign-in library keeps in a session. */
const sessionAccount = sql<string>`(${sessions.sess}->'passport'->>'user')`;

export interface OpenSessionRow {
  sid: string;
  /** What the API notes in the session when it is opened. */
  openedAt: string | null;
  agent: string | null;
  seenAt: Date;
}

/** A request moves the end of its session by the session's whole life: the end minus that is when it was seen last. */
export async function listSessionsByAccount(db: Queryable, accountId: string): Promise<OpenSessionRow[]> {
  const life = sql`(${sessions.sess}->'cookie'->>'originalMaxAge')::float8 * interval '1 millisecond'`;
  const rows = await db
    .select({
      sid: sessions.sid,
      openedAt: sql<string | null>`${sessions.sess}->>'openedAt'`,
      agent: sql<string | null>`${sessions.sess}->>'agent'`,
      // Written as a local time of the connection's zone, and read back in the same.
      seenMs: sql<string>`extract(epoch from ${sessions.expire}::timestamptz - ${life}) * 1000`,
    })
    .from(sessions)
    .where(and(eq(sessionAccount, accountId), gt(sql`${sessions.expire}::timestamptz`, sql`now()`)));
  return rows.map(({ seenMs, ...row }) => ({ ...row, seenAt: new Date(Number(seenMs)) }));
}

/** Every API process looks again whether the streams of this account may stay open. */
const tellSessionsChanged = (db: Queryable, accountId: string) =>
  db.execute(sql`select pg_notify(${channel}, ${`session ${accountId}`})`);

export async function deleteSession(db: Db, accountId: string, sid: string): Promise<void> {
  await db.transaction(async (tx) => {
    await tx.delete(sessions).where(and(eq(sessions.sid, sid), eq(sessionAccount, accountId)));
    await tellSessionsChanged(tx, accountId);
  });
}

/** Sign-out everywhere. */
export async function deleteSessionsOfAccount(db: Queryable, accountId: string): Promise<void> {
  await db.delete(sessions).where(eq(sessionAccount, accountId));
  await tellSessionsChanged(db, accountId);
}

/** Whether a session (by its id) or a token (by its row's id) still opens the door. */
export async function isSignedIn(db: Queryable, door: { sid: string } | { tokenId: string }): Promise<boolean> {
  const active = eq(accounts.state, 'active');
  const [row] =
    'sid' in door
      ? await db
          .select({ id: accounts.id })
          .from(sessions)
          .innerJoin(accounts, eq(sql`${accounts.id}::text`, sessionAccount))
          .where(and(eq(sessions.sid, door.sid), active))
      : await db
          .select({ id: accounts.id })
          .from(accessTokens)
          .innerJoin(accounts, eq(accounts.id, accessTokens.accountId))
          .where(and(eq(accessTokens.id, door.tokenId), usable, active));
  return row !== undefined;
}
