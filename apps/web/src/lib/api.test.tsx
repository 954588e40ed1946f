import { afterEach, expect, test, vi } from 'vitest';
import { addressOf, api } from './api.ts';
import { ApiProblem } from './api-problem.ts';

const answer = (body: unknown, status = 200, type = 'application/json') =>
  vi.fn<typeof fetch>(async () => new Response(JSON.stringify(body), { status, headers: { 'content-type': type } }));

afterEach(() => vi.unstubAllGlobals());

const hash = 'a'.repeat(64);

test('an address is made from the contract; empty filters are left out', () => {
  expect(addressOf('getJob', { params: { hash } })).toBe(`/api/v1/jobs/${hash}`);
  expect(addressOf('listJobs', { query: { text: 'a b', model: '' } })).toBe('/api/v1/jobs?text=a+b');
});

test('a read has no idempotency key, a write has one and a JSON body', async () => {
  const fetch = answer({ ok: true });
  vi.stubGlobal('fetch', fetch);
  await api.call('getHealth');
  await api.call('createToken', { body: { name: 'script', scopes: ['read'] } });
  const [read, write] = fetch.mock.calls.map(([, init]) => init?.headers as Record<string, string>);
  expect(read?.['idempotency-key']).toBeUndefined();
  expect(write?.['idempotency-key']).toMatch(/^[0-9a-f]{32}$/);
  expect(fetch.mock.calls[1]?.[1]?.body).toBe('{"name":"script","scopes":["read"]}');
});

test('a refusal carries its problem document', async () => {
  vi.stubGlobal(
    'fetch',
    answer(
      { code: 'quota-exceeded', status: 422, title: 'Quota', detail: '6 h asked, 2 h left' },
      422,
      'application/problem+json',
    ),
  );
  const refused = await api.call('getQuota').catch((error: unknown) => error);
  expect(refused).toBeInstanceOf(ApiProblem);
  expect(refused).toMatchObject({ code: 'quota-exceeded', status: 422, message: '6 h asked, 2 h left' });
});

test('a page of a proxy and silence become problems too', async () => {
  vi.stubGlobal(
    'fetch',
    vi.fn<typeof globalThis.fetch>(async () => new Response('<h1>Bad gateway</h1>', { status: 502 })),
  );
  await expect(api.call('getQuota')).rejects.toMatchObject({ code: 'unavailable', status: 502 });
  vi.stubGlobal(
    'fetch',
    vi.fn<typeof globalThis.fetch>(async () => Promise.reject(new TypeError('failed'))),
  );
  await expect(api.call('getQuota')).rejects.toMatchObject({ code: 'offline', status: 0 });
});
