import type { ChangeEvent } from '@nightcone/contracts';
import { QueryClient } from '@tanstack/react-query';
import { expect, test, vi } from 'vitest';
import { changeOf } from './events.ts';
import { isStale, Refresher } from './live-data.ts';

const hash = 'a'.repeat(64);
const job: ChangeEvent = { kind: 'job', id: hash };

test('a change concerns the thing it names and the lists it stands in', () => {
  expect(isStale(['getJob', { params: { hash } }], job)).toBe(true);
  expect(isStale(['getJob', { params: { hash: 'b'.repeat(64) } }], job)).toBe(false);
  expect(isStale(['listJobs', { query: {} }], job)).toBe(true);
  expect(isStale(['getQuota', {}], job)).toBe(false);
});

test('only messages of the contract are heard', () => {
  expect(changeOf(JSON.stringify(job))).toEqual(job);
  expect(changeOf('{"kind":"weather","id":"1"}')).toBeUndefined();
  expect(changeOf('not json')).toBeUndefined();
});

test('changes during a slow round lead to exactly one more round', async () => {
  const client = new QueryClient();
  let finish = () => {};
  const invalidate = vi
    .spyOn(client, 'invalidateQueries')
    .mockImplementation(() => new Promise<void>((done) => (finish = done)));
  const refresher = new Refresher(client, () => Promise.resolve());
  refresher.add(job);
  for (let i = 0; i < 100; i++) refresher.add({ kind: 'job', id: `${i}` });
  expect(invalidate).toHaveBeenCalledTimes(1);
  finish();
  await vi.waitFor(() => expect(invalidate).toHaveBeenCalledTimes(2));
  finish();
  await Promise.resolve();
  expect(invalidate).toHaveBeenCalledTimes(2);
});
