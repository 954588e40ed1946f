import type { ChangeEvent } from '@nightcone/contracts';
import { sql } from 'drizzle-orm';
import { afterAll, beforeAll, expect, test } from 'vitest';
import { releaseKernel } from '../../../testing/compute-all.ts';
import {
  type Agent,
  type Login,
  sameOrigin,
  signInAs,
  startTestApi,
  type TestApi,
} from '../../../testing/start-test-api.ts';

let api: TestApi;
beforeAll(async () => {
  api = await startTestApi();
  await releaseKernel(api.db);
});
afterAll(() => api.stop());

/** An open stream, read event by event. */
async function listen(cookie: string) {
  const leave = new AbortController();
  const answer = await fetch(`${api.url}/api/v1/events`, { headers: { cookie }, signal: leave.signal });
  const reader = (answer.body as ReadableStream<Uint8Array>).getReader();
  const decoder = new TextDecoder();
  let text = '';
  const blocks = async function* () {
    for (;;) {
      const { done, value } = await reader.read();
      if (done) return;
      text += decoder.decode(value, { stream: true });
      for (let at = text.indexOf('\n\n'); at >= 0; at = text.indexOf('\n\n')) {
        yield text.slice(0, at);
        text = text.slice(at + 2);
      }
    }
  };
  const all = blocks();
  const opening = (await all.next()).value as string;
  const next = async (): Promise<ChangeEvent | undefined> => {
    const { value, done } = await all.next();
    return done ? undefined : (JSON.parse(/^data: (.*)$/m.exec(value)?.[1] ?? '') as ChangeEvent);
  };
  const until = async (kind: ChangeEvent['kind']): Promise<ChangeEvent> => {
    for (let event = await next(); event; event = await next()) if (event.kind === kind) return event;
    throw new Error(`the stream ended before an event of kind ${kind}`);
  };
  return { answer, opening, next, until, leave: () => leave.abort() };
}

async function signedIn(login: Login): Promise<{ agent: Agent; cookie: string }> {
  await api.as(login);
  const agent = api.anonymous();
  await signInAs(agent, login);
  const cookie = agent.jar.getCookies({ domain: '127.0.0.1', path: '/', secure: false, script: false }).toValueString();
  return { agent, cookie };
}

const submit = (agent: Agent) =>
  agent
    .post('/api/v1/sweeps')
    .set(sameOrigin)
    .send({
      title: 'Heard',
      specification: { model: 'landau-levels', parameters: { fieldT: 1, levels: 2 } },
      axes: [{ pointers: ['/system/massEv'], values: [[Math.random() / 10]] }],
    });

test('is refused without a session', async () => {
  const answer = await fetch(`${api.url}/api/v1/events`);
  expect(answer.status).toBe(401);
});

test('tells the owner of the submission and its sweep, others of the queue only', async () => {
  const [mine, theirs] = [await signedIn('theorist'), await signedIn('theorist-2')];
  const [own, other] = [await listen(mine.cookie), await listen(theirs.cookie)];
  expect(own.answer.headers.get('content-type')).toMatch(/^text\/event-stream/);
  expect(own.answer.headers.get('cache-control')).toBe('no-cache, no-transform');
  expect(own.answer.headers.get('content-encoding')).toBeNull();
  expect(own.opening).toMatch(/^retry: \d+/);
  const { body } = await submit(mine.agent).expect(201);
  await mine.agent.post(`/api/v1/submissions/${body.submissionId}/pause`).set(sameOrigin).expect(200);
  expect(await own.until('submission')).toEqual({ kind: 'submission', id: body.submissionId });
  expect(await own.until('sweep')).toEqual({ kind: 'sweep', id: body.sweepId });
  expect(await other.next()).toEqual({ kind: 'queue', id: 'changed' });
  own.leave();
  other.leave();
});

test('ends at sign-out, and only for who signed out', async () => {
  const [first, second] = [await signedIn('theorist'), await signedIn('theorist')];
  const [ending, staying] = [await listen(first.cookie), await listen(second.cookie)];
  await first.agent.delete('/api/v1/session').set(sameOrigin).expect(204);
  expect(await ending.until('session')).toEqual({ kind: 'session', id: 'ended' });
  expect(await ending.next()).toBeUndefined();
  await submit(second.agent).expect(201);
  expect(await staying.until('quota')).toMatchObject({ kind: 'quota' });
  staying.leave();
});

test('ends when messages may have been missed, so that the browser asks again', async () => {
  const { cookie } = await signedIn('theorist');
  const stream = await listen(cookie);
  await api.db.execute(sql`select pg_terminate_backend(pid) from pg_stat_activity
    where datname = current_database() and query = 'listen nightcone'`);
  for (let event = await stream.next(); event; event = await stream.next()) expect(event.kind).not.toBe('session');
  const again = await listen(cookie);
  expect(again.answer.status).toBe(200);
  again.leave();
});
