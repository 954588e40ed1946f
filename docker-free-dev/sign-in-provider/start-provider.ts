import { createHash, randomBytes } from 'node:crypto';
import { createServer, type IncomingMessage, type ServerResponse } from 'node:http';
import type { AddressInfo } from 'node:net';
import { chooseAccountPage } from './choose-account-page.ts';
import { demoAccounts } from './demo-accounts.ts';

/**
 * A sign-in provider on loopback: the authorization-code flow with state and PKCE (RFC 6749, RFC 7636) at the paths that
 * the sign-in strategy asks for. It knows the demo accounts and nobody else, and checks everything a real one would.
 */
export interface ProviderOptions {
  clientId: string;
  clientSecret: string;
  port?: number;
}
export interface Provider {
  url: string;
  /** Environment of an API that signs in here. */
  environment: Record<string, string>;
  close(): Promise<void>;
}

interface Grant {
  providerId: number;
  redirectUri: string;
  challenge: string;
  expiresAt: number;
}
const lifetimeMs = 10 * 60_000;

export async function startProvider(options: ProviderOptions): Promise<Provider> {
  const grants = new Map<string, Grant>();
  const tokens = new Map<string, number>();

  const send = (res: ServerResponse, status: number, type: string, body: string) =>
    res.writeHead(status, { 'content-type': `${type}; charset=utf-8`, 'cache-control': 'no-store' }).end(body);
  const json = (res: ServerResponse, status: number, body: object) =>
    send(res, status, 'application/json', JSON.stringify(body));

  function authorize(query: URLSearchParams, res: ServerResponse) {
    const redirectUri = query.get('redirect_uri') ?? '';
    const wrong =
      query.get('client_id') !== options.clientId
        ? 'unknown client'
        : !URL.canParse(redirectUri)
          ? 'redirect_uri is missing'
          : !query.get('state')
            ? 'state is missing'
            : query.get('code_challenge_method') !== 'S256' || !query.get('code_challenge')
              ? 'an S256 code challenge is missing'
              : undefined;
    if (wrong) return send(res, 400, 'text/plain', wrong);
    const target = new URL(redirectUri);
    target.searchParams.set('state', query.get('state') as string);
    if (query.has('refuse')) {
      target.searchParams.set('error', 'access_denied');
      return res.writeHead(302, { location: target.href }).end();
    }
    const account = demoAccounts.find(({ login }) => login === query.get('account'));
    if (!account) return send(res, 200, 'text/html', chooseAccountPage(query));
    const code = randomBytes(16).toString('hex');
    const challenge = query.get('code_challenge') as string;
    grants.set(code, { providerId: account.providerId, redirectUri, challenge, expiresAt: Date.now() + lifetimeMs });
    target.searchParams.set('code', code);
    return res.writeHead(302, { location: target.href }).end();
  }

  function exchange(form: URLSearchParams, res: ServerResponse) {
    const code = form.get('code') ?? '';
    const grant = grants.get(code);
    grants.delete(code);
    const verifier = createHash('sha256')
      .update(form.get('code_verifier') ?? '')
      .digest('base64url');
    if (form.get('client_id') !== options.clientId || form.get('client_secret') !== options.clientSecret)
      return json(res, 401, { error: 'invalid_client' });
    if (
      !grant ||
      grant.expiresAt < Date.now() ||
      grant.challenge !== verifier ||
      grant.redirectUri !== form.get('redirect_uri')
    )
      return json(res, 400, { error: 'invalid_grant' });
    const token = randomBytes(16).toString('hex');
    tokens.set(token, grant.providerId);
    return json(res, 200, { access_token: token, token_type: 'bearer', scope: 'read:user' });
  }

  function user(req: IncomingMessage, res: ServerResponse) {
    const token = /^(?:bearer|token) (\S+)$/i.exec(req.headers.authorization ?? '')?.[1] ?? '';
    const account = demoAccounts.find(({ providerId }) => providerId === tokens.get(token));
    if (!account) return json(res, 401, { error: 'invalid_token' });
    return json(res, 200, { id: account.providerId, login: account.login, name: account.name });
  }

  const server = createServer(async (req, res) => {
    const url = new URL(req.url ?? '/', 'http://provider');
    const route = `${req.method} ${url.pathname}`;
    if (route === 'GET /login/oauth/authorize') authorize(url.searchParams, res);
    else if (route === 'POST /login/oauth/access_token') exchange(await readForm(req), res);
    else if (route === 'GET /user') user(req, res);
    else send(res, 404, 'text/plain', 'nothing here');
  });
  await new Promise<void>((resolve, reject) => {
    server.once('error', reject);
    server.listen(options.port ?? 0, '127.0.0.1', resolve);
  });
  const url = `http://127.0.0.1:${(server.address() as AddressInfo).port}`;
  return {
    url,
    environment: {
      NIGHTCONE_GITHUB_CLIENT_ID: options.clientId,
      NIGHTCONE_GITHUB_CLIENT_SECRET: options.clientSecret,
      NIGHTCONE_GITHUB_AUTHORIZATION_URL: `${url}/login/oauth/authorize`,
      NIGHTCONE_GITHUB_TOKEN_URL: `${url}/login/oauth/access_token`,
      NIGHTCONE_GITHUB_USER_URL: `${url}/user`,
    },
    close: () =>
      new Promise((resolve) => {
        server.close(() => resolve());
        server.closeAllConnections();
      }),
  };
}

async function readForm(req: IncomingMessage): Promise<URLSearchParams> {
  let text = '';
  for await (const chunk of req) {
    text += chunk;
    if (text.length > 10_000) break;
  }
  return new URLSearchParams(text);
}
