import { mkdirSync, mkdtempSync, rmSync, writeFileSync } from 'node:fs';
import { tmpdir } from 'node:os';
import path from 'node:path';
import { sql } from 'drizzle-orm';
import { afterAll, beforeAll, describe, expect, test } from 'vitest';
import { startTestApi, type TestApi } from '../../testing/start-test-api.ts';

let api: TestApi;
let folder: string;
beforeAll(async () => {
  folder = mkdtempSync(path.join(tmpdir(), 'nightcone-web-'));
  mkdirSync(path.join(folder, 'assets'));
  writeFileSync(path.join(folder, 'index.html'), '<!doctype html><title>Nightcone</title>');
  writeFileSync(path.join(folder, 'assets', 'app-1a2b.js'), 'export {};');
  api = await startTestApi({ webDist: folder, rateLimits: { requests: 40, plans: 2, lookups: 2, signIns: 1000 } });
});
afterAll(async () => {
  await api.stop();
  rmSync(folder, { recursive: true });
});

describe('the built web application', () => {
  test('is the page under every path that is no file', async () => {
    for (const address of ['/', '/jobs', '/jobs/abc', '/sign-in?failed=1']) {
      const { text, headers } = await api.anonymous().get(address).expect(200);
      expect(text).toMatch(/<title>Nightcone/);
      expect(headers['cache-control']).toBe('no-cache');
    }
  });
  test('has immutable assets, and those that are gone are not the page', async () => {
    const { headers } = await api.anonymous().get('/assets/app-1a2b.js').expect(200);
    expect(headers['cache-control']).toBe('public, max-age=31536000, immutable');
    await api.anonymous().get('/assets/app-0000.js').expect(404);
  });
  test('does not swallow the interface', async () => {
    expect((await api.anonymous().get('/api/v2/jobs').expect(404)).body.code).toBe('not-found');
    await api.anonymous().get('/api/docs').expect(200).expect('content-type', /html/);
    expect((await api.anonymous().get('/api/v1/openapi.json').expect(200)).body.openapi).toBe('3.1.0');
  });
});

test('scripts come from here alone, and WebAssembly may compile', async () => {
  const { headers } = await api.anonymous().get('/').expect(200);
  const policy = headers['content-security-policy'] as string;
  expect(policy).toContain("script-src 'self' 'wasm-unsafe-eval';");
  expect(policy).toContain("default-src 'none'");
  expect(headers['x-powered-by']).toBeUndefined();
});

test('every answer has a request number, a problem repeats it', async () => {
  const { headers, body } = await api.anonymous().get('/api/v1/jobs').expect(401);
  expect(headers['x-request-id']).toBe(body.requestId);
  expect(headers['www-authenticate']).toBe('Bearer');
  const ours = await api.anonymous().get('/api/v1/health').set('x-request-id', 'chosen by the caller').expect(200);
  expect(ours.headers['x-request-id']).toMatch(/^[0-9a-f-]{36}$/);
});

test('health and readiness', async () => {
  expect((await api.anonymous().get('/api/v1/health').expect(200)).body).toEqual({ ok: true });
  const { body } = await api.anonymous().get('/api/v1/ready').expect(200);
  expect(body).toEqual({ ready: false, database: true, kernel: false, workers: 0 });
  expect((await api.anonymous().get('/api/v1/models').expect(503)).body.code).toBe('unavailable');
});

test('too many requests of one person are refused, those of another are not', async () => {
  const [theorist, second] = [await api.as('theorist'), await api.as('theorist-2')];
  const ask = () => theorist.get(`/api/v1/lookup/${'a'.repeat(12)}`);
  await ask().expect(200);
  await ask().expect(200);
  expect((await ask().expect(429)).body.code).toBe('too-many-requests');
  await second.get(`/api/v1/lookup/${'a'.repeat(12)}`).expect(200);
  let last = 200;
  for (let i = 0; i < 60 && last === 200; i++) last = (await second.get('/api/v1/quotas/mine')).status;
  expect(last).toBe(429);
});

test('an error of ours leaks nothing', async () => {
  const reviewer = await api.as('reviewer');
  await api.db.execute(sql`alter table sweep_drafts rename to elsewhere`);
  const theorist = await api.as('admin');
  const { status, body, text } = await theorist.get('/api/v1/drafts');
  expect([status, body.code]).toEqual([500, 'internal']);
  expect(text).not.toMatch(/sweep_drafts|relation|select|stack/i);
  await reviewer.get('/api/v1/health').expect(200);
});
