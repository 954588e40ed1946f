import { Sweep, SweepEstimate, SweepPoint } from '@nightcone/contracts';
import { anySlot, endRetryPauses, startQueue } from '@nightcone/db/testing';
import type { LoadedKernel } from '@nightcone/kernel/node';
import { afterAll, beforeAll, describe, expect, test } from 'vitest';
import { computeAll, releaseKernel } from '../../../testing/compute-all.ts';
import { type Agent, sameOrigin, startTestApi, type TestApi } from '../../../testing/start-test-api.ts';

let api: TestApi;
let kernel: LoadedKernel;
let theorist: Agent;
let second: Agent;
beforeAll(async () => {
  api = await startTestApi();
  kernel = await releaseKernel(api.db);
  [theorist, second] = [await api.as('theorist'), await api.as('theorist-2')];
});
afterAll(() => api.stop());

/** A ladder at a few fields: small, and different for every mass. */
const question = (masses: string[] | { start: string; stop: string; count: number }) => ({
  title: 'Gap against mass',
  specification: {
    model: 'landau-levels',
    parameters: {
      system: { kind: 'monolayer' },
      fieldT: { kind: 'range', start: 1, stop: 5, count: 5 },
      levels: 3,
      energyEv: { kind: 'range', start: -0.3, stop: 0.3, count: 11 },
      carrierPerNm2: { kind: 'range', start: -0.01, stop: 0.01, count: 5 },
    },
  },
  axes: [
    Array.isArray(masses)
      ? { pointers: ['/system/massEv'], values: masses.map((mass) => [Number(mass)]) }
      : { pointers: ['/system/massEv'], range: masses },
  ],
});
const post = (agent: Agent, path: string, body: object, headers: Record<string, string> = {}) =>
  agent
    .post(`/api/v1${path}`)
    .set({ ...sameOrigin, ...headers })
    .send(body);

describe('estimate', () => {
  test('counts, costs and judges every point without storing any', async () => {
    const asked = question({ start: '0 meV', stop: '30 meV', count: 31 });
    const { body } = await post(theorist, '/sweeps/estimate', asked).expect(200);
    const estimate = SweepEstimate.parse(body);
    expect(estimate).toMatchObject({ jobs: 31, alreadyComputed: 0 });
    expect(estimate.cpuMs).toBeGreaterThan(0);
    expect(estimate.quota.fits).toBe(true);
    // Nobody works in this test: no end can be promised.
    expect(estimate.finish).toEqual({ now: null, tonight: null });
    expect(JSON.parse(estimate.first.canonicalText)).toMatchObject({ kernel: kernel.digest, model: 'landau-levels' });
    const { body: jobs } = await theorist.get('/api/v1/jobs').expect(200);
    expect(jobs.total).toBe(0);
  });
  test('a unit in a range is shifted in its decimal text: 0.9 meV is 0.0009 eV', async () => {
    const hashOf = async (start: string) => {
      const { body } = await post(theorist, '/sweeps/estimate', question({ start, stop: '1', count: 2 })).expect(200);
      return body.first.hash;
    };
    expect(await hashOf('0.9 meV')).toBe(await hashOf('0.0009'));
  });
  test('a reviewer may estimate and not submit', async () => {
    const reviewer = await api.as('reviewer');
    await post(reviewer, '/sweeps/estimate', question(['0'])).expect(200);
    await post(reviewer, '/sweeps', question(['0'])).expect(403);
  });
});

describe('a sweep', () => {
  let sweepId: string;
  const asked = question(['0', '0.01', '0.02', '0.03']);

  test('is submitted once under one key', async () => {
    const key = { 'idempotency-key': 'the-first-sweep' };
    const { body } = await post(theorist, '/sweeps', asked, key).expect(201);
    expect(body).toMatchObject({ jobs: 4, alreadyComputed: 0 });
    sweepId = body.sweepId;
    const again = await post(theorist, '/sweeps', asked, key).expect(201);
    expect(again.body).toEqual(body);
    const other = await post(theorist, '/sweeps', { ...asked, title: 'Another' }, key).expect(409);
    expect(other.body.code).toBe('idempotency-mismatch');
    const { body: list } = await theorist.get('/api/v1/sweeps').expect(200);
    expect(list.total).toBe(1);
  });
  test('waits and says why', async () => {
    const { body } = await theorist.get(`/api/v1/sweeps/${sweepId}`).expect(200);
    const sweep = Sweep.parse(body);
    expect(sweep.counts.waiting).toBe(4);
    expect(sweep.submission.why).toBe('No worker takes work at this moment; an admin can start one.');
    expect(sweep.axes[0]?.values).toEqual([[0], [0.01], [0.02], [0.03]]);
  });
  test('is as unknown to another person as none', async () => {
    for (const path of ['', '/points', '/quantities?array=energies'])
      expect((await second.get(`/api/v1/sweeps/${sweepId}${path}`)).status).toBe(404);
    expect((await post(second, `/sweeps/${sweepId}/retry-failed`, {})).status).toBe(404);
  });
  test('is paused, resumed, and refused when it is too late', async () => {
    const { body } = await theorist.get(`/api/v1/sweeps/${sweepId}`).expect(200);
    const change = (agent: Agent, verb: string) => post(agent, `/submissions/${body.submission.id}/${verb}`, {});
    expect((await change(second, 'pause')).status).toBe(404);
    expect((await change(theorist, 'pause').expect(200)).body).toMatchObject({ state: 'paused' });
    expect((await change(theorist, 'pause').expect(409)).body.code).toBe('conflict');
    expect((await change(theorist, 'resume').expect(200)).body).toMatchObject({ state: 'active' });
  });
  test('is computed, and its points tell their results', async () => {
    await computeAll(api.databaseUrl, kernel);
    const { body } = await theorist.get(`/api/v1/sweeps/${sweepId}`).expect(200);
    expect(body.counts.finished).toBe(4);
    expect(body.submission).toMatchObject({ state: 'done', why: '', progress: { done: 4, total: 4, failed: 0 } });
    const points = (await theorist.get(`/api/v1/sweeps/${sweepId}/points`).expect(200)).body.rows as SweepPoint[];
    expect(points.map((point) => SweepPoint.parse(point).values)).toEqual([[0], [0.01], [0.02], [0.03]]);
    expect(points.map(({ index }) => index)).toEqual([0, 1, 2, 3]);
    expect(new Set(points.map(({ resultDigest }) => resultDigest)).size).toBe(4);
  });
  test('gives one row of an array for every point', async () => {
    const { body } = await theorist.get(`/api/v1/sweeps/${sweepId}/quantities?array=magneticLengthNm`).expect(200);
    expect(body.unit).toBe('nm');
    expect(body.rows.map(({ values }: { values: number[] }) => values.length)).toEqual([5, 5, 5, 5]);
    const row = await theorist.get(`/api/v1/sweeps/${sweepId}/quantities?array=magneticLengthNm&row=2`).expect(200);
    expect(row.body.rows[3].values).toEqual([body.rows[3].values[2]]);
    const unknown = await theorist.get(`/api/v1/sweeps/${sweepId}/quantities?array=nothing`).expect(400);
    expect(unknown.body.errors[0]).toMatchObject({ field: 'array', value: 'nothing' });
  });
  test('asked again by somebody else is reused and costs nothing', async () => {
    const { body: estimate } = await post(second, '/sweeps/estimate', asked).expect(200);
    expect(estimate).toMatchObject({ jobs: 4, alreadyComputed: 4, cpuMs: 0 });
    const { body } = await post(second, '/sweeps', asked).expect(201);
    expect(body).toMatchObject({ jobs: 4, alreadyComputed: 4 });
    const sweep = await second.get(`/api/v1/sweeps/${body.sweepId}`).expect(200);
    expect(sweep.body.counts.reused).toBe(4);
    const { body: quota } = await second.get('/api/v1/quotas/mine').expect(200);
    expect([quota.usedMs, quota.reservedMs]).toEqual([0, 0]);
  });
});

test('points that machinery broke off say why, and are put back by hand', async () => {
  const { body } = await post(theorist, '/sweeps', question(['0.04'])).expect(201);
  const queue = await startQueue(api.databaseUrl);
  for (let chunk = await queue.next(anySlot); chunk; chunk = await queue.next(anySlot)) {
    await queue.crash(chunk, 'the slice thread ended', 1000);
    await endRetryPauses(api.db);
  }
  await queue.stop();
  const points = async () => (await theorist.get(`/api/v1/sweeps/${body.sweepId}/points`).expect(200)).body.rows;
  const [broken] = await points();
  expect(broken.state).toBe('broken-off');
  expect(broken.failure.text).toMatch(/slice thread/);
  const retry = () => post(theorist, `/sweeps/${body.sweepId}/retry-failed`, {});
  expect((await retry().expect(200)).body).toEqual({ points: 1 });
  expect((await retry().expect(200)).body).toEqual({ points: 0 });
  await computeAll(api.databaseUrl, kernel);
  expect(await points()).toMatchObject([{ state: 'finished', failure: null }]);
});

test('a quota that does not suffice is told in numbers, and nothing is stored', async () => {
  const huge = question({ start: '0', stop: '0.1', count: 2 });
  const before = (await second.get('/api/v1/sweeps').expect(200)).body.total;
  const { body: estimate } = await post(second, '/sweeps/estimate', huge).expect(200);
  await api.setFreeQuota('theorist-2', 0);
  const { body } = await post(second, '/sweeps', huge).expect(422);
  expect(body.code).toBe('quota-exceeded');
  expect(body.figures).toEqual({ neededMs: Math.ceil(estimate.cpuMs), freeMs: 0 });
  expect((await second.get('/api/v1/sweeps').expect(200)).body.total).toBe(before);
});
