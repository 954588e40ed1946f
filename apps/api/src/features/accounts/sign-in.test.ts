import { afterAll, beforeAll, describe, expect, test } from 'vitest';
import { sameOrigin, signInAs, startTestApi, type TestApi } from '../../../testing/start-test-api.ts';

let api: TestApi;
beforeAll(async () => {
  api = await startTestApi();
});
afterAll(() => api.stop());

describe('sign-in is refused', () => {
  test('with a forged state', async () => {
    const agent = api.anonymous();
    await agent.get('/auth/github').expect(302);
    const { headers } = await agent.get('/auth/github/callback?code=x&state=forged').expect(302);
    expect(headers.location).toBe('/sign-in?failed=1');
  });
  test('without the cookie that began it', async () => {
    const agent = api.anonymous();
    const start = await agent.get('/auth/github').expect(302);
    const choose = new URL(start.headers.location as string);
    choose.searchParams.set('account', 'theorist');
    const back = new URL((await fetch(choose, { redirect: 'manual' })).headers.get('location') as string);
    const { headers } = await api
      .anonymous()
      .get(back.pathname + back.search)
      .expect(302);
    expect(headers.location).toBe('/sign-in?failed=1');
  });
  test('when the person says no at the provider', async () => {
    const agent = api.anonymous();
    const start = await agent.get('/auth/github').expect(302);
    const choose = new URL(start.headers.location as string);
    choose.searchParams.set('refuse', '1');
    const back = new URL((await fetch(choose, { redirect: 'manual' })).headers.get('location') as string);
    const { headers } = await agent.get(back.pathname + back.search).expect(302);
    expect(headers.location).toBe('/sign-in?failed=1');
  });
  test('with a code that the provider does not know', async () => {
    const agent = api.anonymous();
    const start = await agent.get('/auth/github').expect(302);
    const state = new URL(start.headers.location as string).searchParams.get('state');
    const { headers } = await agent.get(`/auth/github/callback?code=unknown&state=${state}`).expect(302);
    expect(headers.location).toBe('/sign-in?failed=1');
  });
});

describe('sign-in', () => {
  test('asks the provider with state and an S256 challenge', async () => {
    const { headers } = await api.anonymous().get('/auth/github').expect(302);
    const query = new URL(headers.location as string).searchParams;
    expect(query.get('code_challenge_method')).toBe('S256');
    expect(query.get('state')).toBeTruthy();
    expect(query.get('scope')).toBe('read:user');
  });
  test('goes back to the page it came from, but never elsewhere', async () => {
    expect(await signInAs(api.anonymous(), 'newcomer', '/jobs?model=landau-levels')).toBe('/jobs?model=landau-levels');
    for (const bad of ['//elsewhere.example', 'https://elsewhere.example/', '/\\elsewhere.example', 'jobs'])
      expect(await signInAs(api.anonymous(), 'newcomer', bad)).toBe('/');
  });
  test('gives the session a new id, and the callback works once', async () => {
    const agent = api.anonymous();
    const start = await agent.get('/auth/github').expect(302);
    const before = String(start.headers['set-cookie']).split(';')[0] as string;
    const choose = new URL(start.headers.location as string);
    choose.searchParams.set('account', 'newcomer');
    const back = new URL((await fetch(choose, { redirect: 'manual' })).headers.get('location') as string);
    const end = await agent.get(back.pathname + back.search).expect(302);
    const cookie = String(end.headers['set-cookie']);
    expect(cookie).toMatch(/HttpOnly; SameSite=Lax/);
    expect(cookie.split(';')[0]).not.toBe(before);
    const old = await api.anonymous().get('/api/v1/session').set('cookie', before).expect(200);
    expect(old.body.account).toBeNull();
    const replay = await agent.get(back.pathname + back.search).expect(302);
    expect(replay.headers.location).toBe('/sign-in?failed=1');
  });
  test('an unknown account waits, whatever its name', async () => {
    const agent = await api.as('newcomer');
    const { body } = await agent.get('/api/v1/session').expect(200);
    expect(body.account).toMatchObject({ login: 'newcomer', state: 'waiting', role: 'theorist' });
    const refused = await agent.get('/api/v1/tokens').expect(403);
    expect(refused.body.code).toBe('account-waiting');
  });
  test('the first admin of the configuration is admitted', async () => {
    const { body } = await (await api.as('admin')).get('/api/v1/session').expect(200);
    expect(body.account).toMatchObject({ state: 'active', role: 'admin' });
  });
});

describe('sign-out', () => {
  test('ends this session', async () => {
    const agent = api.anonymous();
    await signInAs(agent, 'admin');
    await agent.delete('/api/v1/session').set(sameOrigin).expect(204);
    expect((await agent.get('/api/v1/session')).body.account).toBeNull();
  });
  test('everywhere ends all of one account and none of another', async () => {
    const [first, second, other] = [api.anonymous(), api.anonymous(), await api.as('theorist')];
    await signInAs(first, 'theorist-2');
    await signInAs(second, 'theorist-2');
    const { body } = await first.get('/api/v1/sessions').expect(200);
    expect(body.rows).toHaveLength(2);
    expect(body.rows.filter((row: { current: boolean }) => row.current)).toHaveLength(1);
    await second.delete('/api/v1/sessions').set(sameOrigin).expect(204);
    for (const agent of [first, second]) expect((await agent.get('/api/v1/session')).body.account).toBeNull();
    expect((await other.get('/api/v1/session')).body.account).not.toBeNull();
  });
});
