import { afterAll, beforeAll, describe, expect, test } from 'vitest';
import {
  type Agent,
  type Login,
  sameOrigin,
  signInAs,
  startTestApi,
  type TestApi,
} from '../../../testing/start-test-api.ts';

let api: TestApi;
let theorist: Agent;
let admin: Agent;
beforeAll(async () => {
  api = await startTestApi();
  [theorist, admin] = [await api.as('theorist'), await api.as('admin')];
});
afterAll(() => api.stop());

const idOf = async (login: Login) => (await (await api.as(login)).get('/api/v1/session')).body.account.id as string;
const change = (agent: Agent, id: string, body: object) =>
  agent.patch(`/api/v1/accounts/${id}`).set(sameOrigin).send(body);
const createToken = (agent: Agent, body: object) => agent.post('/api/v1/tokens').set(sameOrigin).send(body);

describe('tokens', () => {
  test('are refused with a wrong body', async () => {
    for (const body of [
      {},
      { name: '', scopes: ['read'] },
      { name: 'x', scopes: [] },
      { name: 'x', scopes: ['root'] },
      { name: 'x', scopes: ['read'], expiresInDays: 0 },
      { name: 'x', scopes: ['read'], hash: 'mine' },
    ])
      expect((await createToken(theorist, body)).status).toBe(400);
  });
  test('work until they are revoked; their text shows once', async () => {
    const { body } = await createToken(theorist, { name: 'night script', scopes: ['read', 'read'] }).expect(201);
    expect(body.text).toMatch(/^nct_[\w-]{43}$/);
    expect(body.scopes).toEqual(['read']);
    const withToken = { authorization: `Bearer ${body.text}` };
    await api.anonymous().get('/api/v1/jobs').set(withToken).expect(200);
    const { body: list } = await theorist.get('/api/v1/tokens').expect(200);
    expect(list.rows).toHaveLength(1);
    expect(JSON.stringify(list)).not.toContain(body.text);
    expect(list.rows[0].lastUsedAt).not.toBeNull();
    expect((await (await api.as('theorist-2')).delete(`/api/v1/tokens/${body.id}`).set(sameOrigin)).status).toBe(404);
    await theorist.delete(`/api/v1/tokens/${body.id}`).set(sameOrigin).expect(204);
    expect((await theorist.delete(`/api/v1/tokens/${body.id}`).set(sameOrigin)).status).toBe(404);
    await api.anonymous().get('/api/v1/jobs').set(withToken).expect(401);
  });
  test('cannot give what they do not have', async () => {
    const { body } = await createToken(theorist, { name: 'manages', scopes: ['manage'] }).expect(201);
    const answer = await api
      .anonymous()
      .post('/api/v1/tokens')
      .set('authorization', `Bearer ${body.text}`)
      .send({ name: 'more', scopes: ['submit'] });
    expect([answer.status, answer.body.code]).toEqual([403, 'forbidden']);
  });
  test('end with the session verb when a script signs out', async () => {
    const { body } = await createToken(theorist, { name: 'short', scopes: ['manage'] }).expect(201);
    const withToken = { authorization: `Bearer ${body.text}` };
    await api.anonymous().delete('/api/v1/session').set(withToken).expect(204);
    await api.anonymous().get('/api/v1/tokens').set(withToken).expect(401);
  });
  test('are at most twenty', async () => {
    const reviewer = await api.as('reviewer');
    for (let i = 0; i < 20; i++) await createToken(reviewer, { name: `t${i}`, scopes: ['read'] }).expect(201);
    expect((await createToken(reviewer, { name: 'more', scopes: ['read'] })).status).toBe(409);
  });
});

describe('people', () => {
  test('a person who waits is admitted by an admin, and it stands in the audit', async () => {
    const newcomer = await api.as('newcomer');
    await newcomer.get('/api/v1/jobs').expect(403);
    const id = await idOf('newcomer');
    expect((await change(admin, id, { state: 'active', role: 'reviewer' }).expect(200)).body).toMatchObject({
      state: 'active',
      role: 'reviewer',
    });
    await newcomer.get('/api/v1/jobs').expect(200);
    const entries = await api.listAudit(id);
    expect(entries.at(-1)).toMatchObject({
      action: 'accounts.change',
      before: { state: 'waiting', role: 'theorist' },
      after: { state: 'active', role: 'reviewer' },
      actorId: await idOf('admin'),
    });
    expect(entries.at(-1)?.requestId).toMatch(/^[0-9a-f-]{36}$/);
  });
  test('a deactivated person is out at once, everywhere, and cannot sign in again', async () => {
    const second = await api.as('theorist-2');
    const { body: token } = await createToken(second, { name: 'script', scopes: ['read'] }).expect(201);
    const id = await idOf('theorist-2');
    await change(admin, id, { state: 'deactivated' }).expect(200);
    expect((await second.get('/api/v1/session')).body.account).toBeNull();
    await api.anonymous().get('/api/v1/jobs').set('authorization', `Bearer ${token.text}`).expect(401);
    expect(await signInAs(api.anonymous(), 'theorist-2')).toBe('/sign-in?failed=1');
    await change(admin, id, { state: 'active' }).expect(200);
    expect(await signInAs(api.anonymous(), 'theorist-2')).toBe('/');
  });
  test('states follow their arrows', async () => {
    const id = await idOf('theorist');
    expect((await change(admin, id, { state: 'waiting' })).status).toBe(400);
    expect((await change(admin, '00000000-0000-4000-8000-000000000000', { state: 'active' })).status).toBe(404);
  });
  test('the last admin stays', async () => {
    const id = await idOf('admin');
    for (const body of [{ state: 'deactivated' }, { role: 'theorist' }])
      expect((await change(admin, id, body)).body.code).toBe('conflict');
  });
  test('are listed page by page', async () => {
    const logins: string[] = [];
    let cursor = '';
    do {
      const { body } = await admin.get(`/api/v1/accounts?limit=2${cursor}`).expect(200);
      expect(body.total).toBe(5);
      logins.push(...body.rows.map(({ login }: { login: string }) => login));
      cursor = body.nextCursor ? `&cursor=${body.nextCursor}` : '';
    } while (cursor);
    expect(logins.toSorted()).toEqual(['admin', 'newcomer', 'reviewer', 'theorist', 'theorist-2']);
    expect((await admin.get('/api/v1/accounts?state=waiting').expect(200)).body.rows).toEqual([]);
  });
});

test('one’s own name and time zone', async () => {
  const save = (body: object) => theorist.patch('/api/v1/account').set(sameOrigin).send(body);
  expect((await save({ timeZone: 'Middle/Earth' })).body.errors[0]).toMatchObject({ field: '/timeZone' });
  expect((await save({ role: 'admin' })).status).toBe(400);
  expect((await save({ name: 'T.', timeZone: 'Europe/Berlin' }).expect(200)).body).toMatchObject({
    name: 'T.',
    timeZone: 'Europe/Berlin',
  });
  expect((await save({}).expect(200)).body.name).toBe('T.');
});
