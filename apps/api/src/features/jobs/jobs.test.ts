import { createHash } from 'node:crypto';
import { JobView } from '@nightcone/contracts';
import type { LoadedKernel } from '@nightcone/kernel/node';
import { readNpy, readNpz, readResultJson } from '@nightcone/provenance';
import { afterAll, beforeAll, describe, expect, test } from 'vitest';
import { computeAll, releaseKernel } from '../../../testing/compute-all.ts';
import { type Agent, sameOrigin, startTestApi, type TestApi } from '../../../testing/start-test-api.ts';

let api: TestApi;
let kernel: LoadedKernel;
let theorist: Agent;
let reviewer: Agent;
beforeAll(async () => {
  api = await startTestApi();
  kernel = await releaseKernel(api.db);
  [theorist, reviewer] = [await api.as('theorist'), await api.as('reviewer')];
});
afterAll(() => api.stop());

const specification = (more: object = {}) => ({
  model: 'landau-levels',
  parameters: {
    fieldT: { kind: 'values', values: [1, 2] },
    levels: 2,
    energyEv: 0.1,
    carrierPerNm2: 0.01,
    ...more,
  },
});
const submit = (agent: Agent, body: object) => agent.post('/api/v1/jobs').set(sameOrigin).send(body);
const rerun = (agent: Agent, hash: string, headers = {}) =>
  agent.post(`/api/v1/jobs/${hash}/executions`).set({ ...sameOrigin, ...headers });
/** Bytes of a download. */
const bytes = async (agent: Agent, path: string) => {
  const answer = await agent
    .get(`/api/v1${path}`)
    .buffer(true)
    .parse((res, done) => {
      const parts: Buffer[] = [];
      res.on('data', (part: Buffer) => parts.push(part));
      res.on('end', () => done(null, Buffer.concat(parts)));
    })
    .expect(200);
  return { headers: answer.headers, body: answer.body as Buffer };
};

describe('one job', () => {
  let hash: string;
  let digest: string;

  test('is refused outside the model’s validity, with field, value and limit', async () => {
    // A ladder of 8 states cannot hold levels up to n = 20.
    const short = { ...specification({ levels: 20 }), numerics: { method: { kind: 'ladder', size: 8 } } };
    const { status, body } = await submit(theorist, { specification: short });
    expect([status, body.code]).toEqual([422, 'validity-refused']);
    expect(body.errors).toMatchObject([{ field: '/specification/numerics/method/size', value: 8, limit: '22' }]);
    const estimate = { title: 'Short', specification: short, axes: [] };
    const dry = await theorist.post('/api/v1/sweeps/estimate').set(sameOrigin).send(estimate).expect(200);
    expect(dry.body.notes[0]).toMatchObject({
      code: 'ladder-too-short',
      severity: 'refuse',
      points: 1,
      firstPoints: [0],
      worst: 8,
      limit: 22,
    });
  });
  test('is submitted, and is the same for everybody', async () => {
    const { body } = await submit(theorist, { specification: specification() }).expect(201);
    expect(body.alreadyComputed).toBe(false);
    hash = body.hash;
    const written = { ...specification(), schema: 'nightcone.job/1', kernel: kernel.digest };
    const again = await submit(await api.as('theorist-2'), { specification: written }).expect(201);
    expect(again.body.hash).toBe(hash);
  });
  test('cannot be exported before it has a result', async () => {
    const { body } = await theorist.get(`/api/v1/jobs/${hash}/export?format=json`).expect(409);
    expect(body.detail).toMatch(/waiting/);
  });
  test('has inputs, certificate, arrays and its first execution', async () => {
    await computeAll(api.databaseUrl, kernel);
    const { body } = await reviewer.get(`/api/v1/jobs/${hash}`).expect(200);
    const job = JobView.parse(body);
    expect(job).toMatchObject({ state: 'finished', mine: false, askedBy: { label: 'theorist 1' }, checkFailed: false });
    expect(createHash('sha256').update(job.canonicalText).digest('hex')).toBe(hash);
    expect(job.executions).toHaveLength(1);
    expect(job.executions[0]).toMatchObject({ bits: 'first', state: 'finished', reason: 'first' });
    expect(job.certificate).not.toBeNull();
    digest = job.resultDigest as string;
  });
  test('gives its arrays as raw bytes and as .npy, with their length announced', async () => {
    const result = await theorist.get(`/api/v1/results/${digest}`).expect(200);
    const info = result.body.arrays.find(({ name }: { name: string }) => name === 'energies');
    const raw = await bytes(theorist, `/results/${digest}/arrays/energies`);
    expect(raw.headers['content-length']).toBe(String(info.bytes));
    expect(createHash('sha256').update(raw.body).digest('hex')).toBe(info.sha256);
    const npy = await bytes(theorist, `/results/${digest}/arrays/energies?format=npy`);
    expect(readNpy(npy.body)).toMatchObject({ dtype: 'f64', shape: info.shape });
    await theorist.get(`/api/v1/results/${digest}/arrays/nothing`).expect(404);
  });
  test('is exported as JSON, CSV and a NumPy archive', async () => {
    const json = readResultJson((await bytes(theorist, `/jobs/${hash}/export?format=json`)).body.toString());
    expect(json).toMatchObject({ jobHash: hash, resultDigest: digest });
    const npz = await bytes(theorist, `/jobs/${hash}/export?format=npz`);
    expect(npz.headers['content-disposition']).toMatch(/landau-levels-[0-9a-f]{12}\.npz/);
    expect(readNpz(npz.body).result.arrays).toEqual(json.result.arrays);
    expect((await bytes(theorist, `/jobs/${hash}/export?format=csv`)).body.toString()).toMatch(/energies/);
  });
  test('is re-run by a reviewer: other execution, identical bits, asked for once under one key', async () => {
    const key = { 'idempotency-key': 'one-re-run' };
    const { body } = await rerun(reviewer, hash, key).expect(201);
    expect((await rerun(reviewer, hash, key).expect(201)).body).toEqual(body);
    const waiting = await reviewer.get(`/api/v1/executions/${body.executionId}`).expect(200);
    expect(waiting.body).toMatchObject({ reason: 're-run', bits: null, startedAt: null, askedBy: { label: 'you' } });
    await computeAll(api.databaseUrl, kernel);
    const done = await reviewer.get(`/api/v1/executions/${body.executionId}`).expect(200);
    expect(done.body).toMatchObject({ state: 'finished', bits: 'identical', resultDigest: digest });
    const seen = await theorist.get(`/api/v1/jobs/${hash}`).expect(200);
    expect(seen.body.executions.map(({ bits }: { bits: string }) => bits)).toEqual(['first', 'identical']);
    expect(seen.body.executions[1].askedBy.label).toBe('review');
  });
  test('is found by its hash, by twelve digits of it, and by those of its result', async () => {
    for (const digits of [hash, hash.slice(0, 12)]) {
      const { body } = await reviewer.get(`/api/v1/lookup/${digits}`).expect(200);
      expect(body.hits).toMatchObject([{ kind: 'job', hash, path: `/jobs/${hash}` }]);
    }
    const { body } = await reviewer.get(`/api/v1/lookup/${digest.slice(0, 16)}`).expect(200);
    expect(body.hits).toMatchObject([{ kind: 'result', hash: digest, path: `/jobs/${hash}` }]);
    const program = await reviewer.get(`/api/v1/lookup/${kernel.digest}`).expect(200);
    expect(program.body.hits).toMatchObject([{ kind: 'kernel' }]);
    expect((await reviewer.get(`/api/v1/lookup/${'e'.repeat(20)}`).expect(200)).body.hits).toEqual([]);
  });
  test('a re-run of a job that does not exist is not found', async () => {
    expect((await rerun(reviewer, 'a'.repeat(64))).status).toBe(404);
  });
});

describe('the list of jobs', () => {
  beforeAll(async () => {
    for (const levels of [3, 4, 5, 6]) await submit(theorist, { specification: specification({ levels }) }).expect(201);
  });
  const list = async (agent: Agent, query: string) => (await agent.get(`/api/v1/jobs?${query}`).expect(200)).body;

  test.each(['createdAt', 'finishedAt', 'cpuMs', 'model'])(
    'by %s: pages join to the whole, both ways',
    async (sort) => {
      for (const direction of ['ascending', 'descending']) {
        const whole = await list(theorist, `sort=${sort}&direction=${direction}`);
        expect(whole).toMatchObject({ total: 5, nextCursor: null });
        const hashes: string[] = [];
        let cursor = '';
        do {
          const page = await list(theorist, `sort=${sort}&direction=${direction}&limit=2${cursor}`);
          hashes.push(...page.rows.map((row: { hash: string }) => row.hash));
          cursor = page.nextCursor ? `&cursor=${page.nextCursor}` : '';
        } while (cursor);
        expect(hashes).toEqual(whole.rows.map((row: { hash: string }) => row.hash));
      }
    },
  );
  test('a cursor of one order is refused in another', async () => {
    const { nextCursor } = await list(theorist, 'sort=model&limit=1');
    await theorist.get(`/api/v1/jobs?sort=cpuMs&limit=1&cursor=${nextCursor}`).expect(400);
  });
  test('filters by state, model, owner and text', async () => {
    expect((await list(theorist, 'state=finished')).total).toBe(1);
    expect((await list(theorist, 'model=continuum-ribbon')).total).toBe(0);
    expect((await list(theorist, 'mine=true')).total).toBe(5);
    expect((await list(reviewer, 'mine=true')).total).toBe(1);
    expect((await list(reviewer, 'mine=false')).total).toBe(4);
    const { rows } = await list(theorist, 'state=waiting&limit=1');
    expect((await list(theorist, `text=${rows[0].hash.slice(0, 8)}`)).total).toBe(1);
    expect((await list(theorist, 'text=%25')).total).toBe(0);
    expect((await list(theorist, 'text=landau')).total).toBe(5);
  });
});

test('what one submits is told to others by number, to admins by name', async () => {
  const labels = async (agent: Agent) =>
    (await agent.get('/api/v1/jobs?state=finished').expect(200)).body.rows[0].askedBy.label;
  expect(await labels(theorist)).toBe('you');
  expect(await labels(reviewer)).toBe('theorist 1');
  expect(await labels(await api.as('admin'))).toBe('Theorist');
});
