import { LastNight, Night, type Submission } from '@nightcone/contracts';
import { saveSettings } from '@nightcone/db';
import { startQueue } from '@nightcone/db/testing';
import type { LoadedKernel } from '@nightcone/kernel/node';
import { afterAll, beforeAll, describe, expect, test } from 'vitest';
import { computeAll, releaseKernel } from '../../../testing/compute-all.ts';
import { type Agent, sameOrigin, startTestApi, type TestApi } from '../../../testing/start-test-api.ts';
import { stripSpan } from './get-night.ts';

let api: TestApi;
let kernel: LoadedKernel;
let theorist: Agent;
let second: Agent;
beforeAll(async () => {
  api = await startTestApi();
  kernel = await releaseKernel(api.db);
  [theorist, second] = [await api.as('theorist'), await api.as('theorist-2')];
  // Whatever the hour of this test: the night begins in six hours.
  const clock = (hours: number) => new Date(Date.now() + hours * 3_600_000).toISOString().slice(11, 16);
  const night = { timeZone: 'UTC', nightFrom: clock(6), nightTo: clock(12) };
  await saveSettings(api.db, { accountId: null, requestId: null }, night);
});
afterAll(() => api.stop());

let mass = 0;
const submit = async (agent: Agent, points: number, when: 'now' | 'tonight' = 'now') => {
  const values = Array.from({ length: points }, () => [++mass / 1000]);
  const { body } = await agent
    .post('/api/v1/sweeps')
    .set(sameOrigin)
    .send({
      title: `Of ${points}`,
      when,
      specification: { model: 'landau-levels', parameters: { fieldT: 1, levels: 2 } },
      axes: [{ pointers: ['/system/massEv'], values }],
    })
    .expect(201);
  return body as { sweepId: string; submissionId: string };
};
const open = async (agent: Agent) => (await agent.get('/api/v1/submissions').expect(200)).body.rows as Submission[];

describe('with a worker that takes work', () => {
  test('open work shows to everybody, one’s own first; titles and sweeps of others stay theirs', async () => {
    const worker = await startQueue(api.databaseUrl);
    const mine = await submit(theorist, 3);
    const theirs = await submit(second, 2, 'tonight');
    const rows = await open(second);
    expect(rows.map(({ id }) => id)).toEqual([theirs.submissionId, mine.submissionId]);
    expect(rows[0]).toMatchObject({ title: 'Of 2', mine: true, sweepId: theirs.sweepId, owner: { label: 'you' } });
    expect(rows[1]).toMatchObject({ title: 'Landau levels', sweepId: null, owner: { label: 'theorist 1' } });
    expect(rows[1]?.progress).toEqual({ done: 0, total: 3, running: 0, failed: 0 });
    expect((await theorist.get(`/api/v1/submissions/${theirs.submissionId}`).expect(200)).body.mine).toBe(false);
    await worker.stop();
  });

  test('every submission has an expected end and says why it has not started', async () => {
    const worker = await startQueue(api.databaseUrl);
    const [tonight, now] = await open(second);
    expect(tonight?.expectedEnd?.plusMinusS).toBeGreaterThan(0);
    expect(now?.why).toMatch(/^It is next/);
    const night = Night.parse((await second.get('/api/v1/queue/night').expect(200)).body);
    expect(tonight?.why).toMatch(/^It is marked tonight and may start at \d\d:\d\d \(UTC\), in (5 h 59 min|6 h)/);
    expect(new Date(tonight?.expectedEnd?.at ?? 0) >= new Date(night.window.from)).toBe(true);
    expect(night.slots).toEqual({ total: 2, busy: 0 });
    expect(night.myEnd?.at).toBe(tonight?.expectedEnd?.at);
    await worker.stop();
  });

  test('the night strip has a lane for each person: mine named, others by number, names for admins', async () => {
    const worker = await startQueue(api.databaseUrl);
    const night = Night.parse((await second.get('/api/v1/queue/night').expect(200)).body);
    expect(night.lanes.map(({ label }) => label)).toEqual(['you', 'theorist 1']);
    expect(night.lanes[0]?.bars[0]).toMatchObject({ title: 'Of 2', state: 'waiting' });
    expect(night.lanes[1]?.bars[0]).toMatchObject({ title: null, submissionId: null });
    expect(night.lanes.every(({ name }) => name === null)).toBe(true);
    const admin = await api.as('admin');
    const seen = Night.parse((await admin.get('/api/v1/queue/night').expect(200)).body);
    expect(seen.lanes.map(({ name }) => name)).toEqual(expect.arrayContaining(['Theorist', 'Second theorist']));
    await worker.stop();
  });
});

test('the strip runs from dusk to dawn and always holds now', () => {
  const night = { from: new Date('2026-02-12T19:00:00Z'), to: new Date('2026-02-13T06:00:00Z'), open: false };
  expect(stripSpan({ night, now: new Date('2026-02-12T18:10:00Z') })).toEqual({
    from: new Date('2026-02-12T17:00:00Z'),
    to: new Date('2026-02-13T08:00:00Z'),
  });
  expect(stripSpan({ night, now: new Date('2026-02-12T09:40:00Z') }).from).toEqual(new Date('2026-02-12T09:00:00Z'));
});

test('what was computed is a bar whose area is its CPU time, and it is charged', async () => {
  await computeAll(api.databaseUrl, kernel);
  const night = Night.parse((await theorist.get('/api/v1/queue/night').expect(200)).body);
  const done = night.lanes[0]?.bars.filter(({ state }) => state === 'done') ?? [];
  const area = done.reduce((sum, { from, to, slots }) => sum + slots * (Date.parse(to) - Date.parse(from)), 0);
  // computeAll records one millisecond for each of the three jobs.
  expect(area).toBeCloseTo(3, 3);
  const { body: quota } = await theorist.get('/api/v1/quotas/mine').expect(200);
  expect(quota).toMatchObject({ usedMs: 3, reservedMs: 0 });
  expect(quota.line.at(-1).usedMs).toBe(3);
  const { body: ledger } = await theorist.get('/api/v1/quotas/mine/entries').expect(200);
  const sum = (kind: string) =>
    ledger.rows
      .filter((row: { kind: string }) => row.kind === kind)
      .reduce((a: number, row: { ms: number }) => a + row.ms, 0);
  expect([sum('grant'), sum('settle')]).toEqual([quota.grantedMs, 3]);
});

test('what has ended shows to its owner only', async () => {
  const { body } = await theorist.get('/api/v1/submissions?open=false').expect(200);
  expect(body.rows).toMatchObject([{ state: 'done', why: '', expectedEnd: null }]);
  const id = body.rows[0].id;
  await theorist.get(`/api/v1/submissions/${id}`).expect(200);
  await second.get(`/api/v1/submissions/${id}`).expect(404);
});

test('an admin may cancel anybody’s work; what was reserved is free again', async () => {
  const { submissionId } = await submit(second, 5, 'tonight');
  const reserved = (await second.get('/api/v1/quotas/mine').expect(200)).body.reservedMs;
  expect(reserved).toBeGreaterThan(0);
  const cancel = (agent: Agent) => agent.post(`/api/v1/submissions/${submissionId}/cancel`).set(sameOrigin);
  expect((await cancel(theorist)).status).toBe(404);
  expect((await cancel(await api.as('admin')).expect(200)).body.state).toBe('cancelled');
  expect((await cancel(second)).status).toBe(409);
  expect((await second.get('/api/v1/quotas/mine').expect(200)).body.reservedMs).toBeLessThan(reserved);
});

test('last night is told, also when nothing happened', async () => {
  const report = LastNight.parse((await second.get('/api/v1/queue/last-night').expect(200)).body);
  expect(report).toMatchObject({ sweeps: 0, finished: 0, rows: [], largestResidualEv: null });
  // What was computed a moment ago is moved into that night.
  await api.moveExecutions(new Date(Date.parse(report.to) - 3_600_000));
  const mine = LastNight.parse((await theorist.get('/api/v1/queue/last-night').expect(200)).body);
  expect(mine).toMatchObject({ sweeps: 1, finished: 3, failed: 0, rows: [{ title: 'Of 3', finished: 3, total: 3 }] });
  expect(mine.checksHeld).toBe(mine.checksMade);
});

test('workers with their slots', async () => {
  const worker = await startQueue(api.databaseUrl);
  const { body } = await theorist.get('/api/v1/workers').expect(200);
  expect(body.rows.filter(({ state }: { state: string }) => state === 'active')).toMatchObject([
    { id: worker.worker.id, slots: 2, busy: 0, speedFactor: 1 },
  ]);
  await worker.stop();
});
