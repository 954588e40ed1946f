import type { Endpoint } from '@nightcone/contracts';
import { findOptionalAccount, findOptionalTokenHolder, type Pool } from '@nightcone/db';
import compression from 'compression';
import connectPg from 'connect-pg-simple';
import express, { type Express, type RequestHandler } from 'express';
import session from 'express-session';
import { accountView } from './features/accounts/account-view.ts';
import { recordSignIn } from './features/accounts/record-sign-in.ts';
import { authenticate } from './http/authenticate.ts';
import { sendProblem } from './http/error-handler.ts';
import { requestLog } from './http/logging.ts';
import { mountEndpoints } from './http/mount.ts';
import { perMinute } from './http/rate-limits.ts';
import { sameOriginOnly } from './http/same-origin.ts';
import { securityHeaders } from './http/security-headers.ts';
import { signIn } from './http/sign-in.ts';
import { staticWeb } from './http/static-web.ts';
import { describeApi } from './openapi/describe-api.ts';
import { Refusal } from './refusal.ts';
import { routes } from './routes.ts';
import type { Services } from './services.ts';

const sessionDays = 14;

/** The whole HTTP side. It opens nothing itself: services come from main.ts or from a test. */
export function createApp(services: Services, pool: Pool): Express {
  const { config, db, logger } = services;
  const provider = new URL(config.github.authorizationUrl ?? 'https://github.com');
  const app = express();
  app.disable('x-powered-by');
  app.set('trust proxy', 'loopback');
  app.use(requestLog(logger));
  app.use(securityHeaders(config.publicUrl, provider.origin));
  // Streams of events must not wait in a compressor's buffer; arrays are announced with their length.
  app.use(
    compression({ filter: (req, res) => !isStream(res.getHeader('content-type')) && compression.filter(req, res) }),
  );

  const Store = connectPg(session);
  const withSession = session({
    name: 'nightcone.sid',
    secret: config.sessionSecret,
    resave: false,
    saveUninitialized: false,
    store: new Store({
      pool,
      tableName: 'sessions',
      createTableIfMissing: false,
      pruneSessionInterval: 15 * 60,
      errorLog: (error) => logger.error({ reason: String(error) }, 'session store'),
    }),
    cookie: {
      httpOnly: true,
      sameSite: 'lax',
      secure: config.publicUrl.startsWith('https:'),
      maxAge: sessionDays * 86_400_000,
    },
  });
  const { auth, router: signInRoutes } = signIn(config, {
    recordSignIn: (profile) => recordSignIn(db, profile, config.firstAdmin),
    findOptionalAccount: async (id) => {
      const row = await findOptionalAccount(db, id);
      return row && accountView(row);
    },
  });
  const knowCaller: RequestHandler[] = [
    withSession,
    auth.initialize(),
    auth.session(),
    authenticate(async (hash) => {
      const holder = await findOptionalTokenHolder(db, hash);
      return holder && { account: accountView(holder.account), scopes: holder.scopes, tokenId: holder.tokenId };
    }),
  ];

  app.use('/auth', perMinute(config.rateLimits.signIns, 'sign-ins'));
  app.use('/auth', withSession, auth.initialize());
  app.use(signInRoutes);

  const { requests, plans, lookups } = config.rateLimits;
  const planLimit = perMinute(plans, 'plans');
  const lookupLimit = perMinute(lookups, 'look-ups');
  const limitsOf = ({ id }: Endpoint): RequestHandler[] =>
    id === 'estimateSweep' || id === 'submitSweep' || id === 'submitJob'
      ? [planLimit]
      : id === 'lookupHash'
        ? [lookupLimit]
        : [];
  app.use(describeApi());
  app.use('/api/v1', ...knowCaller, perMinute(requests, 'requests'), sameOriginOnly(config.publicUrl));
  app.use('/api/v1', mountEndpoints(routes, services, limitsOf));
  app.use(['/api', '/auth'], () => {
    throw new Refusal('not-found', 'There is no such endpoint; /api/docs lists them.');
  });
  if (config.webDist) app.use(staticWeb(config.webDist));
  app.use(sendProblem);
  return app;
}

const isStream = (type: unknown) => String(type).startsWith('text/event-stream');
