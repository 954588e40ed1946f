import { mkdtemp, readFile, stat } from 'node:fs/promises';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { addCustomSection, loadCurrentKernel } from '@nightcone/kernel/node';
import { npzChunks, type ResultRecord, resultDigest } from '@nightcone/provenance';
import { afterEach, describe, expect, test } from 'vitest';
import { run } from '../testing/run.ts';
import { type Answers, standInServer } from '../testing/stand-in-server.ts';

const hash = 'b'.repeat(64);
const id = '00000000-0000-4000-8000-000000000001';
const other = '00000000-0000-4000-8000-000000000002';
let server: Awaited<ReturnType<typeof standInServer>> | undefined;
const serve = async (answers: Answers) => (server = await standInServer(answers));
afterEach(async () => {
  await server?.close();
  server = undefined;
});
const folder = () => mkdtemp(join(tmpdir(), 'nightcone-'));

describe('login', () => {
  test('tries the token and keeps it for its owner only', async () => {
    const { url, asked } = await serve({
      'GET /session': () => ({ body: { account: { login: 'theorist', role: 'theorist' } } }),
    });
    const env = { XDG_CONFIG_HOME: await folder() };
    const ran = await run(['login', `${url}/`], { stdin: 'nct_secret\n', env });
    expect(ran).toMatchObject({ exitCode: 0 });
    expect(ran.out).toContain('theorist (theorist)');
    expect(ran.out + ran.err).not.toContain('nct_secret');
    expect(asked[0]?.headers.authorization).toBe('Bearer nct_secret');
    const file = join(env.XDG_CONFIG_HOME, 'nightcone', 'config.json');
    expect(JSON.parse(await readFile(file, 'utf8'))).toEqual({ url, token: 'nct_secret' });
    expect((await stat(file)).mode & 0o777).toBe(0o600);
    const elsewhere = await run(['follow', hash], { env: { ...env, NIGHTCONE_URL: 'http://127.0.0.1:1' } });
    expect(elsewhere.problem().code).toBe('not-signed-in');
  });

  test('refuses a token that the server does not know, and an address that would send it in the open', async () => {
    const { url } = await serve({ 'GET /session': () => ({ body: { account: null } }) });
    expect((await run(['login', url], { stdin: 'x' })).problem().code).toBe('not-signed-in');
    expect((await run(['login', 'http://nightcone.example'], { stdin: 'x' })).problem().detail).toMatch(/unencrypted/);
    expect((await run(['login', url], { stdin: '' })).problem().detail).toMatch(/token is missing/);
  });
});

describe('submit', () => {
  const job = { 'POST /jobs': () => ({ status: 201, body: { hash, submissionId: id, alreadyComputed: false } }) };

  test('a job, with a key', async () => {
    const { env, asked } = await serve(job);
    const ran = await run(['submit', '-', '--tonight', '--key', 'the-same-key'], { stdin: { model: 'm' }, env });
    expect(ran).toMatchObject({ exitCode: 0, out: `job ${hash}\n` });
    expect(asked[0]?.body).toEqual({ specification: { model: 'm' }, when: 'tonight' });
    expect(asked[0]?.headers['idempotency-key']).toBe('the-same-key');
  });

  test('a sweep', async () => {
    const { env, asked } = await serve({
      'POST /sweeps': () => ({ status: 201, body: { sweepId: id, submissionId: other, jobs: 60, alreadyComputed: 2 } }),
    });
    const sweep = {
      title: 'widths',
      specification: { model: 'm' },
      axes: [{ pointers: ['/width/count'], values: [[10], [11]] }],
    };
    const ran = await run(['submit', '-'], { stdin: sweep, env });
    expect(ran.out).toBe(`sweep ${id}\nsubmission ${other}\n60 jobs, 2 computed already\n`);
    expect(asked[0]?.body).toMatchObject({ title: 'widths', when: 'now', axes: sweep.axes });
    const untitled = await run(['submit', '-'], { stdin: { ...sweep, title: undefined }, env });
    expect(untitled.exitCode).toBe(2);
    expect(untitled.problem().errors?.[0]?.field).toBe('/title');
  });

  test('a refusal of the server is passed on with its document', async () => {
    const document = {
      type: 'about:blank',
      title: 'No',
      status: 422,
      code: 'quota-exceeded',
      detail: 'The quota is used up.',
    };
    const { env } = await serve({ 'POST /jobs': () => ({ status: 422, body: document }) });
    const ran = await run(['submit', '-'], { stdin: { model: 'm' }, env });
    expect(ran.exitCode).toBe(2);
    expect(ran.problem()).toEqual(document);
  });

  test('a server that is not there, or broken, is a failure and no wrong input', async () => {
    const gone = { NIGHTCONE_URL: 'http://127.0.0.1:1', NIGHTCONE_TOKEN: 'x' };
    expect(await run(['submit', '-'], { stdin: {}, env: gone })).toMatchObject({ exitCode: 1 });
    const { env } = await serve({ 'POST /jobs': () => ({ status: 502, body: 'proxy' }) });
    expect((await run(['submit', '-'], { stdin: {}, env })).err).toMatch(/answered 502/);
    expect((await run(['submit', '-'], { stdin: {} })).problem().code).toBe('not-signed-in');
  });
});

describe('follow', () => {
  test('a job until it has a result', async () => {
    const states = ['waiting', 'running', 'running', 'finished'];
    const { env } = await serve({
      [`GET /jobs/${hash}`]: () => {
        const state = states.shift() ?? 'finished';
        return { body: { state, resultDigest: state === 'finished' ? 'd' : null, checkFailed: false } };
      },
    });
    const ran = await run(['follow', hash], { env });
    expect(ran).toMatchObject({ exitCode: 0, out: 'result d\n' });
    expect(ran.err.split('\n')).toHaveLength(4);
  });

  test('a job that the kernel refused ends with 3', async () => {
    const failure = { code: 'not-converged', text: 'No.' };
    const { env } = await serve({
      [`GET /jobs/${hash}`]: () => ({ body: { state: 'failed', resultDigest: null, failure } }),
    });
    expect(await run(['follow', hash], { env })).toMatchObject({ exitCode: 3, out: '' });
  });

  test('a sweep through its submission, a submission by itself', async () => {
    const progress = { done: 60, total: 60, failed: 0, running: 0 };
    const { env } = await serve({
      [`GET /sweeps/${id}`]: () => ({ body: { submission: { id: other } } }),
      [`GET /submissions/${other}`]: () => ({ body: { state: 'done', unit: 'jobs', why: '', progress } }),
    });
    const expected = { exitCode: 0, out: 'done: 60 of 60 jobs, 0 failed\n' };
    expect(await run(['follow', id], { env })).toMatchObject(expected);
    expect(await run(['follow', other], { env })).toMatchObject(expected);
  });
});

describe('fetch', () => {
  const bytes = new Uint8Array(new Float64Array([1, 2]).buffer);
  const record: ResultRecord = {
    specification: {
      schema: 'nightcone.job/1',
      model: 'm',
      parameters: {},
      numerics: {},
      tables: [],
      kernel: 'c'.repeat(64),
    },
    jobHash: hash,
    resultDigest: '',
    notes: [],
    result: {
      arrays: [{ name: 'e', dtype: 'f64', shape: [2], dims: ['level'], unit: 'eV', bytes }],
      certificate: { numbers: {}, checks: [] },
    },
  };

  test('checks what it downloads', async () => {
    const good = { ...record, resultDigest: await resultDigest(record.result) };
    let sent = good;
    const { env, asked } = await serve({
      [`GET /jobs/${hash}/export`]: () => ({ bytes: Buffer.concat([...npzChunks(sent)]) }),
    });
    const out = join(await folder(), 'result.npz');
    const ran = await run(['fetch', hash, '--out', out], { env });
    expect(ran).toMatchObject({ exitCode: 0 });
    expect(ran.out).toContain(good.resultDigest);
    expect(asked[0]?.path).toBe(`/jobs/${hash}/export?format=npz`);
    sent = { ...good, resultDigest: '0'.repeat(64) };
    expect(await run(['fetch', hash, '--out', out], { env })).toMatchObject({ exitCode: 4 });
  });
});

describe('reproduce on the queue', () => {
  const rerun = (bits: string, state = 'finished'): Answers => ({
    [`POST /jobs/${hash}/executions`]: () => ({ status: 201, body: { executionId: id, submissionId: other } }),
    [`GET /executions/${id}`]: () => ({
      body: { state, bits, resultDigest: 'd', progress: { done: 1, total: 1 }, failure: null },
    }),
  });

  test('identical is 0, different is 4, broken off is 1', async () => {
    const identical = await serve(rerun('identical'));
    expect(await run(['reproduce', hash], identical)).toMatchObject({ exitCode: 0, out: 'identical  d\n' });
    await identical.close();
    const different = await serve(rerun('different'));
    expect(await run(['reproduce', hash], different)).toMatchObject({ exitCode: 4, out: 'different  d\n' });
    await different.close();
    expect(await run(['reproduce', hash], await serve(rerun('identical', 'broken-off')))).toMatchObject({
      exitCode: 1,
    });
  });
});

describe('reproduce here', () => {
  const specification = { model: 'landau-levels', parameters: { fieldT: 5, levels: 2, broadening: { kind: 'none' } } };

  test('downloads specification and kernel, computes, compares', async () => {
    const { bytes } = await loadCurrentKernel();
    const printed = JSON.parse((await run(['compute', '-', '--json'], { stdin: specification })).out);
    const job = {
      state: 'finished',
      kernel: printed.kernel,
      resultDigest: printed.resultDigest,
      specification: printed.specification,
    };
    let module: Uint8Array = bytes;
    const { env } = await serve({
      [`GET /jobs/${printed.jobHash}`]: () => ({ body: job }),
      [`GET /jobs/${hash}`]: () => ({ body: job }),
      [`GET /kernels/${printed.kernel}/module`]: () => ({ bytes: module }),
    });
    const here = () => run(['reproduce', printed.jobHash, '--here'], { env });
    expect(await here()).toMatchObject({ exitCode: 0, out: `identical  ${printed.resultDigest}\n` });
    const mislabelled = await run(['reproduce', hash, '--here'], { env });
    expect(mislabelled).toMatchObject({ exitCode: 4, err: expect.stringContaining('specification has the hash') });
    job.resultDigest = 'd'.repeat(64);
    expect(await here()).toMatchObject({ exitCode: 4, out: `different  ${printed.resultDigest}\n` });
    module = addCustomSection(bytes, 'other', new Uint8Array(1));
    expect(await here()).toMatchObject({ exitCode: 4, err: expect.stringContaining('another kernel') });
  });
});
