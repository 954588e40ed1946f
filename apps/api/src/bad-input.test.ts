import { afterAll, beforeAll, describe, expect, test } from 'vitest';
import { releaseKernel } from '../testing/compute-all.ts';
import { type Agent, sameOrigin, startTestApi, type TestApi } from '../testing/start-test-api.ts';

let api: TestApi;
let theorist: Agent;
let theorist2: Agent;
beforeAll(async () => {
  api = await startTestApi();
  await releaseKernel(api.db);
  [theorist, theorist2] = [await api.as('theorist'), await api.as('theorist-2')];
});
afterAll(async () => {
  // Whatever was refused has stored nothing.
  for (const list of ['jobs', 'sweeps']) expect((await theorist.get(`/api/v1/${list}`)).body.total).toBe(0);
  await api.stop();
});

const post = (path: string, body: object | string) =>
  theorist.post(`/api/v1${path}`).set(sameOrigin).type('application/json').send(body);
const landau = (more: object = {}) => ({ model: 'landau-levels', ...more });
const sweep = (specification: object, axes: object[] = []) => ({ title: 'Not good', specification, axes });

describe.each(['/sweeps', '/sweeps/estimate'])('POST %s refuses', (path) => {
  const refused = async (body: object | string, status: number, code: string) => {
    const answer = await post(path, body);
    expect([answer.status, answer.body.code, answer.type]).toEqual([status, code, 'application/problem+json']);
    expect(answer.body.requestId).toMatch(/^[0-9a-f-]{36}$/);
    return answer.body;
  };

  test('an unknown parameter, naming the nearest', async () => {
    const specification = landau({ parameters: { feildT: 3 } });
    const { errors } = await refused(sweep(specification), 422, 'invalid-specification');
    expect(errors[0]).toMatchObject({ field: '/specification/parameters/feildT', value: 3 });
    expect(errors[0].message).toMatch(/nearest known name is fieldT/);
  });
  test('an unknown member of the body', async () => {
    const { errors } = await refused({ ...sweep(landau()), tonight: true }, 400, 'invalid-input');
    expect(errors[0].field).toBe('/tonight');
  });
  test('an unknown model', async () => {
    const { errors } = await refused(sweep({ model: 'landau-level' }), 422, 'invalid-specification');
    expect(errors[0].message).toMatch(/landau-levels/);
  });
  test('a quantity where a number belongs', async () => {
    const specification = landau({ parameters: { fieldT: '5 T' } });
    const { errors } = await refused(sweep(specification), 422, 'invalid-specification');
    expect(errors[0]).toMatchObject({ field: '/specification/parameters/fieldT', value: '5 T' });
  });
  test('a range in a unit of another kind, and one that is none', async () => {
    for (const [start, words] of [
      ['1 T', /another kind of unit/],
      ['1 parsnip', /no unit known/],
      ['one', /no number/],
    ] as const) {
      const axes = [{ pointers: ['/system/massEv'], range: { start, stop: '1', count: 3 } }];
      const { errors } = await refused(sweep(landau(), axes), 422, 'invalid-specification');
      expect(errors[0]).toMatchObject({ field: '/axes/0/range/start', value: start });
      expect(errors[0].message).toMatch(words);
    }
  });
  test('NaN, which JSON does not have, and numbers beyond doubles', async () => {
    const text = '{"title":"t","specification":{"model":"landau-levels","parameters":{"fieldT":NaN}}}';
    expect((await refused(text, 400, 'invalid-input')).detail).toMatch(/not JSON/);
    const beyond = '{"title":"t","specification":{"model":"landau-levels","parameters":{"fieldT":1e999}}}';
    const { errors } = await refused(beyond, 400, 'invalid-input');
    expect(errors[0].field).toBe('/specification/parameters/fieldT');
  });
  test('a range of 10⁹ points, at once', async () => {
    const axes = [{ pointers: ['/system/massEv'], range: { start: '0', stop: '1', count: 1e9 } }];
    const began = performance.now();
    const problem = await refused(sweep(landau(), axes), 422, 'too-many-points');
    expect(performance.now() - began).toBeLessThan(2000);
    expect(problem.errors[0]).toMatchObject({ field: '/axes/0/range/count', value: 1e9, limit: '100,000' });
    expect(problem.figures).toEqual({ points: 1e9, limit: 100_000 });
  });
  test('axes whose product is too large', async () => {
    const range = { start: '0', stop: '1', count: 400 };
    const axes = ['/system/massEv', '/diracVelocityEvNm'].map((pointer) => ({ pointers: [pointer], range }));
    expect((await refused(sweep(landau(), axes), 422, 'too-many-points')).figures.points).toBe(160_000);
  });
  test('10⁹ points of an axis inside the job', async () => {
    const fieldT = { kind: 'range', start: 0, stop: 1, count: 1e9 };
    await refused(sweep(landau({ parameters: { fieldT } })), 422, 'invalid-specification');
  });
  test('a point out of range, naming the point', async () => {
    const axes = [{ pointers: ['/system/massEv'], values: [[0], [1], [99]] }];
    const { errors } = await refused(sweep(landau(), axes), 422, 'invalid-specification');
    expect(errors[0]).toMatchObject({ field: '/specification/parameters/system/massEv', value: 99 });
    expect(errors[0].message).toMatch(/^Point 2: /);
  });
  test('a pointer to nothing, and values that are missing', async () => {
    const nowhere = [{ pointers: ['/nothing'], values: [[1]] }];
    expect((await refused(sweep(landau(), nowhere), 422, 'invalid-specification')).errors[0].field).toMatch(
      /^\/axes\/0/,
    );
    const uneven = [{ pointers: ['/system/massEv'], values: [[1, 2]] }];
    expect((await refused(sweep(landau(), uneven), 422, 'invalid-specification')).errors[0].field).toMatch(
      /^\/axes\/0/,
    );
    const neither = [{ pointers: ['/system/massEv'] }];
    await refused(sweep(landau(), neither), 422, 'invalid-specification');
  });
  test('a kernel digest that does not exist', async () => {
    const kernel = 'ab'.repeat(32);
    const { errors } = await refused(sweep(landau({ kernel })), 422, 'unknown-kernel');
    expect(errors[0]).toMatchObject({ field: '/specification/kernel', value: kernel });
  });
  test('a body of 2 MB', async () => {
    const problem = await refused({ ...sweep(landau()), title: 'x'.repeat(2_000_000) }, 413, 'body-too-large');
    expect(problem.detail).toMatch(/1 MiB/);
  });
  test('no body, an array, a text', async () => {
    const { body } = await theorist.post(`/api/v1${path}`).set(sameOrigin).expect(400);
    expect(body.code).toBe('invalid-input');
    for (const text of ['[]', '"text"', 'null', '{']) await refused(text, 400, 'invalid-input');
  });
});

test('another person’s draft is as unknown as none', async () => {
  const draft = { title: 'Mine', model: 'landau-levels', body: { parameters: {} } };
  const { body } = await post('/drafts', draft).expect(201);
  const missing = await theorist2.get('/api/v1/drafts/00000000-0000-4000-8000-000000000000').expect(404);
  const other = await theorist2.get(`/api/v1/drafts/${body.id}`).expect(404);
  expect({ ...other.body, requestId: '' }).toEqual({ ...missing.body, requestId: '' });
  expect((await theorist2.put(`/api/v1/drafts/${body.id}`).set(sameOrigin).send(draft)).status).toBe(404);
  expect((await theorist2.delete(`/api/v1/drafts/${body.id}`).set(sameOrigin)).status).toBe(404);
  expect((await theorist2.get('/api/v1/drafts')).body.rows).toEqual([]);
  const kept = await theorist.get(`/api/v1/drafts/${body.id}`).expect(200);
  expect(kept.body).toMatchObject(draft);
  const newer = await theorist
    .put(`/api/v1/drafts/${body.id}`)
    .set(sameOrigin)
    .send({ ...draft, title: 'Newer' });
  expect(newer.body.title).toBe('Newer');
  await theorist.delete(`/api/v1/drafts/${body.id}`).set(sameOrigin).expect(204);
  await theorist.get(`/api/v1/drafts/${body.id}`).expect(404);
});

test.each([
  '/jobs/xyz',
  `/jobs/${'f'.repeat(64)}`,
  `/jobs/${'F'.repeat(64)}`,
  '/executions/1',
  `/results/${'0'.repeat(64)}`,
  `/results/${'0'.repeat(64)}/arrays/..%2F..%2Fetc`,
  '/lookup/abc',
  '/sweeps/1;drop table sweeps',
  '/nothing',
])('GET %s is not found, in a problem document', async (path) => {
  const answer = await theorist.get(`/api/v1${path}`);
  expect([answer.status, answer.body.code, answer.type]).toEqual([404, 'not-found', 'application/problem+json']);
});

test.each([
  ['/jobs?limit=0', 'limit'],
  ['/jobs?limit=1000000', 'limit'],
  ['/jobs?limit=ten', 'limit'],
  ['/jobs?sort=hash', 'sort'],
  ['/jobs?cursor=bm90IGEgY3Vyc29y', 'cursor'],
  ['/jobs?limit=1&limit=2', 'limit'],
])('GET %s names the parameter', async (path, field) => {
  const { status, body } = await theorist.get(`/api/v1${path}`);
  expect([status, body.code, body.errors[0].field]).toEqual([400, 'invalid-input', field]);
});

test('a path that is no UTF-8 is refused politely', async () => {
  const { status, body } = await theorist.get('/api/v1/jobs/%ff');
  expect([status, body.code]).toEqual([400, 'invalid-input']);
});

test.each([
  ['a zero byte', '{"title":"a\\u0000b","model":"landau-levels","body":1}', '/title'],
  ['a zero byte in depth', '{"title":"a","model":"landau-levels","body":{"x":[1,"\\u0000"]}}', '/body/x/1'],
  ['half of a surrogate pair', '{"title":"a","model":"landau-levels","body":{"x":"\\ud83d"}}', '/body/x'],
])('%s is refused with its place', async (_, text, field) => {
  const { status, body } = await post('/drafts', text);
  expect([status, body.code, body.errors[0].field]).toEqual([400, 'invalid-input', field]);
});
test('a whole surrogate pair is a letter', async () => {
  const text = '{"title":"a","model":"landau-levels","body":{"x":"\\ud83d\\ude00"}}';
  expect((await post('/drafts', text).expect(201)).body.body).toEqual({ x: '\u{1f600}' });
});
test('a zero byte in a query is refused', async () => {
  expect((await theorist.get('/api/v1/jobs?text=a%00b')).status).toBe(400);
});
