import type { Order, PartRecord } from '@nightcone/db/queue';
import { afterEach, beforeEach, describe, expect, it, vi } from 'vitest';
import { Recorder } from './recorder.ts';

const failure = (index: number): PartRecord => ({ index, cpuUs: 1, outcome: 'failure', code: 'c', text: 't' });
const failures = (count: number) => Array.from({ length: count }, (_, index) => failure(index));

describe('the recorder of a chunk', () => {
  const writes: number[] = [];
  const orders: Order[] = [];
  const failed: unknown[] = [];
  let answer: () => Promise<Order>;
  let recorder: Recorder;
  beforeEach(() => {
    vi.useFakeTimers();
    for (const list of [writes, orders, failed]) list.length = 0;
    answer = async () => 'go';
    recorder = new Recorder({
      write: (records) => {
        writes.push(records.length);
        return answer();
      },
      onOrder: (order) => orders.push(order),
      onFailure: (error) => failed.push(error),
    });
  });
  afterEach(() => vi.useRealTimers());

  it('writes at most once a second while little comes', async () => {
    recorder.add(failures(1));
    recorder.add(failures(2));
    await vi.advanceTimersByTimeAsync(999);
    expect(writes).toEqual([]);
    await vi.advanceTimersByTimeAsync(1);
    expect(writes).toEqual([3]);
    expect(orders).toEqual(['go']);
  });

  it('writes 500 parts at once when many come, and the rest when drained', async () => {
    recorder.add(failures(1201));
    await recorder.drain();
    expect(writes).toEqual([500, 500, 201]);
  });

  it('writes at once when many bytes wait', async () => {
    recorder.add([{ index: 0, cpuUs: 1, outcome: 'payloads', payloads: [new Uint8Array(33 * 2 ** 20)] }]);
    expect(writes).toEqual([1]);
    await recorder.drain();
  });

  it('never writes twice at the same time', async () => {
    let release: (order: Order) => void = () => {};
    answer = () =>
      new Promise((resolve) => {
        release = resolve;
      });
    recorder.add(failures(500));
    recorder.add(failures(500));
    expect(writes).toEqual([500]);
    answer = async () => 'yield';
    release('go');
    // Nothing more comes: what waited is written all the same.
    await vi.advanceTimersByTimeAsync(0);
    expect(writes).toEqual([500, 500]);
    expect(orders).toEqual(['go', 'yield']);
  });

  it('stops at a write that is refused', async () => {
    answer = () => Promise.reject(new Error('refused'));
    recorder.add(failures(1000));
    await recorder.drain();
    expect(writes).toEqual([500]);
    expect(failed).toEqual([new Error('refused')]);
  });
});
