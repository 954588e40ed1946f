import { scopes } from '@nightcone/contracts';
import type { RequestHandler } from 'express';
import type { Caller } from '../context.ts';
import { Refusal } from '../refusal.ts';
import { tokenHash, tokenPrefix } from '../token-hash.ts';
import { setCaller } from './caller.ts';

/**
 * Says who calls. A token in the Authorization header comes before the cookie; a wrong one is refused and never falls
 * back to the cookie. A deactivated account is nobody.
 */
export function authenticate(findCallerByToken: (hash: string) => Promise<Caller | undefined>): RequestHandler {
  return async (req, _res, next) => {
    const header = req.get('authorization');
    if (header !== undefined) {
      const text = /^Bearer (\S{1,200})$/i.exec(header)?.[1];
      const caller = text?.startsWith(tokenPrefix) ? await findCallerByToken(tokenHash(text)) : undefined;
      if (!caller || caller.account.state === 'deactivated')
        throw new Refusal('not-signed-in', 'This token is unknown, expired or revoked.');
      setCaller(req, caller);
    } else if (req.user && req.user.state !== 'deactivated') {
      setCaller(req, { account: req.user, scopes, sessionId: req.sessionID });
    }
    next();
  };
}
