import { z } from 'zod';

const httpUrl = z.url({ protocol: /^https?$/, error: 'must be an http or https address' });

/** Every variable the API reads; .env.example describes them for people. */
const Environment = z.object({
  NIGHTCONE_DATABASE_URL: z.url({ protocol: /^postgres(ql)?$/, error: 'must be a postgres:// address' }),
  NIGHTCONE_SESSION_SECRET: z.string().min(32, 'must have at least 32 characters'),
  NIGHTCONE_PUBLIC_URL: httpUrl,
  NIGHTCONE_GITHUB_CLIENT_ID: z.string().min(1),
  NIGHTCONE_GITHUB_CLIENT_SECRET: z.string().min(1),
  NIGHTCONE_GITHUB_AUTHORIZATION_URL: httpUrl.optional(),
  NIGHTCONE_GITHUB_TOKEN_URL: httpUrl.optional(),
  NIGHTCONE_GITHUB_USER_URL: httpUrl.optional(),
  NIGHTCONE_FIRST_ADMIN: z
    .string()
    .regex(/^\d{1,20}$/, 'must be the numeric id at the sign-in provider')
    .optional(),
  NIGHTCONE_HOST: z.string().min(1).default('127.0.0.1'),
  NIGHTCONE_PORT: z.coerce.number().int().min(0).max(65535).default(3000),
  NIGHTCONE_WEB_DIST: z.string().min(1).optional(),
  NIGHTCONE_LOG_LEVEL: z.enum(['fatal', 'error', 'warn', 'info', 'debug', 'trace', 'silent']).default('info'),
});

export interface Config {
  databaseUrl: string;
  sessionSecret: string;
  /** Origin under which browsers reach the API; cookies are secure when it is https. */
  publicUrl: string;
  github: {
    clientId: string;
    clientSecret: string;
    authorizationUrl?: string;
    tokenUrl?: string;
    userUrl?: string;
  };
  /** Provider id of the person who becomes the first admin at sign-in. */
  firstAdmin?: string;
  host: string;
  port: number;
  /** Folder of the built web application; absent while Vite serves it. */
  webDist?: string;
  logLevel: string;
  /** Requests per minute and caller. */
  rateLimits: { requests: number; plans: number; lookups: number; signIns: number };
  /** Tests check every response against its contract; production trusts the types. */
  checkResponses: boolean;
}

export const defaultRateLimits = { requests: 1200, plans: 120, lookups: 120, signIns: 60 };

export class BadEnvironment extends Error {
  override name = 'BadEnvironment';
  constructor(readonly variables: { name: string; message: string }[]) {
    super(`the environment is incomplete:\n${variables.map((v) => `  ${v.name}: ${v.message}`).join('\n')}`);
  }
}

/** Reads the environment; throws one BadEnvironment that lists every missing or bad variable. Values are never quoted. */
export function readConfig(environment: Record<string, string | undefined>): Config {
  // An empty variable is an absent one: `NAME=` in a file means "not set" to people.
  const set = Object.fromEntries(
    Object.entries(environment).filter(([, value]) => value !== undefined && value !== ''),
  );
  const parsed = Environment.safeParse(set);
  if (!parsed.success) {
    throw new BadEnvironment(
      parsed.error.issues.map((issue) => {
        const name = String(issue.path[0]);
        return { name, message: name in set ? issue.message : 'is not set' };
      }),
    );
  }
  const env = parsed.data;
  return {
    databaseUrl: env.NIGHTCONE_DATABASE_URL,
    sessionSecret: env.NIGHTCONE_SESSION_SECRET,
    publicUrl: new URL(env.NIGHTCONE_PUBLIC_URL).origin,
    github: {
      clientId: env.NIGHTCONE_GITHUB_CLIENT_ID,
      clientSecret: env.NIGHTCONE_GITHUB_CLIENT_SECRET,
      authorizationUrl: env.NIGHTCONE_GITHUB_AUTHORIZATION_URL,
      tokenUrl: env.NIGHTCONE_GITHUB_TOKEN_URL,
      userUrl: env.NIGHTCONE_GITHUB_USER_URL,
    },
    firstAdmin: env.NIGHTCONE_FIRST_ADMIN,
    host: env.NIGHTCONE_HOST,
    port: env.NIGHTCONE_PORT,
    webDist: env.NIGHTCONE_WEB_DIST,
    logLevel: env.NIGHTCONE_LOG_LEVEL,
    rateLimits: defaultRateLimits,
    checkResponses: false,
  };
}
