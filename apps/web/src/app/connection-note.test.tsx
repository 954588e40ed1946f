import { QueryClient } from '@tanstack/react-query';
import { act, render, screen } from '@testing-library/react';
import { afterEach, beforeEach, expect, test, vi } from 'vitest';
import { useLiveData } from '../lib/live-data.ts';
import { ConnectionNote } from './connection-note.tsx';

/** Stands for the browser's EventSource; `last` is the one that the page holds. */
class FakeSource {
  static last: FakeSource;
  static readonly CLOSED = 2;
  readyState = 0;
  onopen: (() => void) | null = null;
  onerror: (() => void) | null = null;
  private readonly listeners = new Map<string, (event: { data: string }) => void>();
  constructor(readonly address: string) {
    FakeSource.last = this;
  }
  addEventListener(kind: string, listener: (event: { data: string }) => void) {
    this.listeners.set(kind, listener);
  }
  hear(data: unknown) {
    this.listeners.get('message')?.({ data: JSON.stringify(data) });
  }
  close() {
    this.readyState = FakeSource.CLOSED;
  }
}

const client = new QueryClient();
function Page() {
  useLiveData(client, true);
  return <ConnectionNote />;
}

beforeEach(() => {
  vi.useFakeTimers();
  vi.stubGlobal('EventSource', FakeSource);
});
afterEach(() => {
  vi.useRealTimers();
  vi.unstubAllGlobals();
  vi.restoreAllMocks();
});
const after = (ms: number) => act(() => vi.advanceTimersByTimeAsync(ms));
const note = () => screen.queryByText(/not connected/i);

test('a short break says nothing, a longer one does, and the page catches up on everything', async () => {
  const invalidate = vi.spyOn(client, 'invalidateQueries').mockResolvedValue();
  render(<Page />);
  act(() => FakeSource.last.onopen?.());
  act(() => FakeSource.last.onerror?.());
  await after(1000);
  expect(note()).toBeNull();
  await after(2000);
  expect(note()).not.toBeNull();
  act(() => FakeSource.last.onopen?.());
  await after(10);
  expect(note()).toBeNull();
  const [filters] = invalidate.mock.calls[0] ?? [];
  expect(filters?.predicate?.({ queryKey: ['getQuota', {}] } as never)).toBe(true);
});

test('a stream that the server refused is opened again', async () => {
  render(<Page />);
  const first = FakeSource.last;
  first.readyState = FakeSource.CLOSED;
  act(() => first.onerror?.());
  await after(5000);
  expect(FakeSource.last).not.toBe(first);
  expect(FakeSource.last.address).toBe('/api/v1/events');
});

test('a change refreshes what it names and nothing else', async () => {
  const invalidate = vi.spyOn(client, 'invalidateQueries').mockResolvedValue();
  render(<Page />);
  act(() => FakeSource.last.hear({ kind: 'quota', id: 'mine' }));
  await after(10);
  const [filters] = invalidate.mock.calls[0] ?? [];
  expect(filters?.predicate?.({ queryKey: ['getQuota', {}] } as never)).toBe(true);
  expect(filters?.predicate?.({ queryKey: ['listJobs', {}] } as never)).toBe(false);
});
