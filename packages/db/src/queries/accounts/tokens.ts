import type { Scope } from '@nightcone/contracts';
import { and, asc, eq, gt, isNull, lt, or, sql } from 'drizzle-orm';
import type { Db, Queryable } from '../../client.ts';
import { accessTokens, accounts } from '../../schema/accounts.ts';
import { type Actor, saveAuditEntry } from '../audit.ts';
import { channel } from '../events/listen.ts';

export type TokenRow = typeof accessTokens.$inferSelect;

export const usable = and(
  isNull(accessTokens.revokedAt),
  or(isNull(accessTokens.expiresAt), gt(accessTokens.expiresAt, sql`now()`)),
);

export async function listTokensByAccount(db: Queryable, accountId: string): Promise<TokenRow[]> {
  return db
    .select()
    .from(accessTokens)
    .where(and(eq(accessTokens.accountId, accountId), isNull(accessTokens.revokedAt)))
    .orderBy(asc(accessTokens.createdAt));
}

export interface NewToken {
  accountId: string;
  name: string;
  hash: string;
  scopes: Scope[];
  expiresAt: Date | null;
}

/** Undefined when the account already holds `most` tokens. */
export async function saveToken(db: Db, actor: Actor, token: NewToken, most: number): Promise<TokenRow | undefined> {
  return db.transaction(async (tx) => {
    await tx.select({ id: accounts.id }).from(accounts).where(eq(accounts.id, token.accountId)).for('no key update');
    const held = await listTokensByAccount(tx, token.accountId);
    if (held.length >= most) return undefined;
    const [row] = await tx.insert(accessTokens).values(token).returning();
    const { id, name, scopes, expiresAt } = row as TokenRow;
    const entry = {
      action: 'accounts.create-token',
      subject: 'token',
      subjectId: id,
      after: { name, scopes, expiresAt },
    };
    await saveAuditEntry(tx, actor, entry);
    return row;
  });
}

/** False when there is no such token of this account, or it is revoked already. */
export async function revokeToken(db: Db, actor: Actor, accountId: string, id: string): Promise<boolean> {
  return db.transaction(async (tx) => {
    const [row] = await tx
      .update(accessTokens)
      .set({ revokedAt: new Date() })
      .where(and(eq(accessTokens.id, id), eq(accessTokens.accountId, accountId), isNull(accessTokens.revokedAt)))
      .returning();
    if (!row) return false;
    const entry = { action: 'accounts.revoke-token', subject: 'token', subjectId: id, before: { name: row.name } };
    await saveAuditEntry(tx, actor, entry);
    await tx.execute(sql`select pg_notify(${channel}, ${`session ${accountId}`})`);
    return true;
  });
}

/** The account and scopes behind a token that is neither revoked nor expired; its use is noted once a minute. */
export async function findOptionalTokenHolder(db: Db, hash: string) {
  const [row] = await db
    .select({ account: accounts, token: accessTokens })
    .from(accessTokens)
    .innerJoin(accounts, eq(accounts.id, accessTokens.accountId))
    .where(and(eq(accessTokens.hash, hash), usable));
  if (!row) return undefined;
  const stale = or(isNull(accessTokens.lastUsedAt), lt(accessTokens.lastUsedAt, sql`now() - interval '1 minute'`));
  await db
    .update(accessTokens)
    .set({ lastUsedAt: sql`now()` })
    .where(and(eq(accessTokens.id, row.token.id), stale));
  return { account: row.account, tokenId: row.token.id, scopes: row.token.scopes as Scope[] };
}
