import type { Account } from '@nightcone/contracts';
import { Router } from 'express';
import passport from 'passport';
import { Strategy } from 'passport-github2';
import type { Config } from '../config.ts';

declare global {
  namespace Express {
    interface User extends Account {}
  }
}
declare module 'express-session' {
  interface SessionData {
    returnTo?: string;
    openedAt?: string;
    agent?: string;
  }
}

/** What the provider says of a person; only `providerId` identifies anybody. */
export interface ProviderProfile {
  providerId: string;
  login: string;
  name: string;
  email: string | null;
}

export interface SignInDoors {
  /** Creates or updates the account behind a provider id; undefined refuses the sign-in. */
  recordSignIn(profile: ProviderProfile): Promise<Account | undefined>;
  findOptionalAccount(id: string): Promise<Account | undefined>;
}

interface GitHubProfile {
  id: string;
  username?: string;
  displayName?: string;
  emails?: { value: string }[];
}

/** A path of our own: one leading slash, no second one, nothing that a browser reads as one. */
export function localPath(value: unknown): string {
  return typeof value === 'string' && /^\/(?![/\\])[^\\\s]*$/.test(value) && value.length <= 500 ? value : '/';
}

const failure = '/sign-in?failed=1';

/** Passport with the provider, its session serializer, and the two sign-in routes. Not the global singleton. */
export function signIn(config: Config, doors: SignInDoors) {
  const auth = new passport.Passport();
  const options = {
    clientID: config.github.clientId,
    clientSecret: config.github.clientSecret,
    callbackURL: `${config.publicUrl}/auth/github/callback`,
    scope: ['read:user'],
    // Both are known to the strategy's base class and missing from its types.
    state: true,
    pkce: true,
    ...(config.github.authorizationUrl ? { authorizationURL: config.github.authorizationUrl } : {}),
    ...(config.github.tokenUrl ? { tokenURL: config.github.tokenUrl } : {}),
    ...(config.github.userUrl ? { userProfileURL: config.github.userUrl } : {}),
  };
  type Done = (error: unknown, account?: Account | false) => void;
  const verify = (_access: string, _refresh: string, profile: GitHubProfile, done: Done) => {
    const login = profile.username ?? profile.id;
    const name = profile.displayName || login;
    doors
      .recordSignIn({ providerId: String(profile.id), login, name, email: profile.emails?.[0]?.value ?? null })
      .then((account) => done(null, account ?? false), done);
  };
  auth.use(new Strategy(options as never, verify as never));
  auth.serializeUser((account, done) => done(null, account.id));
  auth.deserializeUser((id: string, done) => {
    doors.findOptionalAccount(id).then((account) => done(null, account ?? false), done);
  });

  const router = Router();
  router.get('/auth/github', (req, res, next) => {
    req.session.returnTo = localPath(req.query.returnTo);
    auth.authenticate('github')(req, res, next);
  });
  router.get(
    '/auth/github/callback',
    (req, res, next) => {
      // Passport gives the session a new id here; keepSessionInfo carries returnTo over.
      const authenticate = auth.authenticate('github', { failureRedirect: failure, keepSessionInfo: true });
      authenticate(req, res, (error?: unknown) => {
        if (!error) return next();
        // A bad code, or a provider that is down.
        req.log.warn({ reason: error instanceof Error ? error.name : 'unknown' }, 'sign-in failed');
        res.redirect(failure);
      });
    },
    (req, res, next) => {
      const target = localPath(req.session.returnTo);
      delete req.session.returnTo;
      req.session.openedAt = new Date().toISOString();
      req.session.agent = (req.get('user-agent') ?? '').slice(0, 200);
      req.session.save((error) => (error ? next(error) : res.redirect(target)));
    },
  );
  return { auth, router };
}
