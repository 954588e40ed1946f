import { type Endpoint, endpoints } from '@nightcone/contracts';
import { afterAll, beforeAll, describe, expect, test } from 'vitest';
import { type Agent, type Login, sameOrigin, startTestApi, type TestApi } from '../testing/start-test-api.ts';

let api: TestApi;
const agents = new Map<Login, Agent>();
beforeAll(async () => {
  api = await startTestApi();
  for (const login of ['theorist', 'reviewer', 'admin', 'newcomer'] as const) agents.set(login, await api.as(login));
});
afterAll(() => api.stop());

const all: Endpoint[] = Object.values(endpoints);
/** A path with ids that name nothing, and no body: whoever is let in gets past the policy and no further. */
const path = (endpoint: Endpoint) =>
  `/api/v1${endpoint.path
    .replace(/:(hash|digest)/g, 'f'.repeat(64))
    .replace(/:id/g, '00000000-0000-4000-8000-000000000000')
    .replace(/:name/g, 'energies')}`;
const ask = (agent: Agent, endpoint: Endpoint, headers: Record<string, string> = sameOrigin) =>
  agent[endpoint.method](path(endpoint)).set(headers);

test('every endpoint has its own method and path', () => {
  expect(new Set(all.map(({ method, path: p }) => `${method} ${p}`)).size).toBe(all.length);
});

describe.each(all.filter(({ access }) => access !== 'anyone'))('$id', (endpoint) => {
  test('refuses who is not signed in', async () => {
    const { status, body, type } = await ask(api.anonymous(), endpoint);
    expect([status, body.code, type]).toEqual([401, 'not-signed-in', 'application/problem+json']);
  });
  test('refuses a token that nobody gave', async () => {
    const { status } = await ask(api.anonymous(), endpoint, { authorization: 'Bearer nct_made-up' });
    expect(status).toBe(401);
  });
  const roles = Array.isArray(endpoint.access) ? endpoint.access : [];
  test.each((['theorist', 'reviewer', 'admin'] as const).filter((role) => roles.length > 0 && !roles.includes(role)))(
    'refuses the role %s',
    async (role) => {
      const { status, body } = await ask(agents.get(role) as Agent, endpoint);
      expect([status, body.code]).toEqual([403, 'forbidden']);
    },
  );
});

const admitted = all.filter(({ access }) => Array.isArray(access));
test.each(admitted)('$id refuses an account that waits', async (endpoint) => {
  const { status, body } = await ask(agents.get('newcomer') as Agent, endpoint);
  expect([status, body.code]).toEqual([403, 'account-waiting']);
});

const writes = all.filter(({ method }) => method !== 'get');
test.each(writes)('$id refuses a page of another site', async (endpoint) => {
  const admin = agents.get('admin') as Agent;
  for (const foreign of [
    { 'sec-fetch-site': 'cross-site' },
    { 'sec-fetch-site': 'same-site' },
    { origin: 'https://elsewhere.example' },
    { origin: 'null' },
    {},
  ]) {
    const { status, body } = await ask(admin, endpoint, foreign as Record<string, string>);
    expect([status, body.code]).toEqual([403, 'cross-origin']);
  }
});

test('a token without the scope is refused, with it let in', async () => {
  const theorist = agents.get('theorist') as Agent;
  const { body: token } = await theorist
    .post('/api/v1/tokens')
    .set(sameOrigin)
    .send({ name: 'reads', scopes: ['read'] })
    .expect(201);
  const withToken = { authorization: `Bearer ${token.text}` };
  for (const endpoint of all.filter(({ access, scope }) => access !== 'anyone' && scope !== 'read')) {
    const { status, body } = await ask(api.anonymous(), endpoint, withToken);
    expect([endpoint.id, status, body.code]).toEqual([endpoint.id, 403, 'forbidden']);
  }
  await api.anonymous().get('/api/v1/jobs').set(withToken).expect(200);
});
