import { randomBytes } from 'node:crypto';
import { type endpoints, limits } from '@nightcone/contracts';
import { saveToken } from '@nightcone/db';
import type { Handler } from '../../context.ts';
import { Refusal } from '../../refusal.ts';
import { tokenHash, tokenPrefix } from '../../token-hash.ts';
import { tokenView } from './account-view.ts';

/** A token can do no more than what made it. Its text leaves here once; only its hash is stored. */
export const createToken: Handler<typeof endpoints.createToken> = async ({ ctx, input }) => {
  const { account, scopes: held } = ctx.caller;
  const { name, expiresInDays } = input.body;
  const scopes = [...new Set(input.body.scopes)];
  const missing = scopes.find((scope) => !held.includes(scope));
  if (missing) throw new Refusal('forbidden', `A token without the scope '${missing}' cannot give it.`);
  const text = tokenPrefix + randomBytes(32).toString('base64url');
  const expiresAt = expiresInDays === null ? null : new Date(Date.now() + expiresInDays * 86_400_000);
  const row = await saveToken(
    ctx.services.db,
    { accountId: account.id, requestId: ctx.requestId },
    { accountId: account.id, name, hash: tokenHash(text), scopes, expiresAt },
    limits.tokensPerAccount,
  );
  if (!row)
    throw new Refusal('conflict', `An account holds at most ${limits.tokensPerAccount} tokens; revoke one first.`);
  return { ...tokenView(row), text };
};
