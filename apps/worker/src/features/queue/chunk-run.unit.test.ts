import type { Chunk, Order, PartRecord, Task } from '@nightcone/db/queue';
import { afterEach, beforeEach, describe, expect, it } from 'vitest';
import { ComputeThread } from '../../threads/compute-thread.ts';
import { type FakeParameters, spinningModule } from '../../threads/testing/fake-kernel.ts';
import { ChunkRun } from './chunk-run.ts';

let thread: ComputeThread;
beforeEach(() => {
  thread = new ComputeThread({ entry: new URL('../../threads/testing/fake-slice-thread.ts', import.meta.url) });
});
afterEach(() => thread.close());

const wholeTask = (index: number, parameters: FakeParameters): Task => ({
  index,
  point: index,
  jobHash: `job ${index}`,
  executionId: `execution ${index}`,
  specification: JSON.stringify({ model: 'fake', parameters, numerics: {} }),
  kernelDigest: 'k',
  sliceFrom: 0,
  sliceTo: parameters.slices,
  slices: parameters.slices,
  kind: 'whole',
});

/** A queue that notes what it is told and answers every record with the next of `orders`. */
function fakeQueue(orders: (Order | Error)[] = []) {
  const calls: unknown[][] = [];
  const records: PartRecord[] = [];
  let first: () => void;
  const recorded = new Promise<void>((resolve) => {
    first = resolve;
  });
  return {
    calls,
    records,
    /** Resolves at the first record. */
    recorded,
    worker: { id: 'w', host: 'h', pid: 1, slots: 1, memoryBytes: 1, speedFactor: 1 },
    async record(_chunk: Chunk, some: readonly PartRecord[]): Promise<Order> {
      const answer = orders.shift() ?? 'go';
      first();
      if (answer instanceof Error) throw answer;
      if (answer !== 'lost') records.push(...some);
      return answer;
    },
    payloads: async () => [Uint8Array.of(4), Uint8Array.of(5)],
    finish: async () => calls.push(['finish']) > 0,
    crash: async (_chunk: Chunk, reason: string, cpuUs: number) => void calls.push(['crash', reason, cpuUs >= 0]),
  };
}

function start(queue: ReturnType<typeof fakeQueue>, tasks: Task[], budgetMs = 4000) {
  const chunk: Chunk = { id: 'c', attempt: 1, submissionId: 's', budgetMs, memoryBytes: 1, tasks };
  return new ChunkRun({
    chunk,
    thread,
    queue,
    jobOf: async ({ jobHash, kernelDigest, specification }) => {
      if (kernelDigest !== 'k') throw new Error(`kernel ${kernelDigest} is not stored in this database`);
      return { hash: jobHash, kernel: kernelDigest, module: spinningModule, specification, tables: new Map() };
    },
  });
}

const busy = (slices: number): FakeParameters => ({ slices, acts: new Array(slices).fill('work-20-ms') });

describe('one attempt at a chunk', { timeout: 20_000 }, () => {
  it('records results, payloads, assemblies and refusals, then finishes', async () => {
    const queue = fakeQueue();
    const run = start(queue, [
      wholeTask(0, { slices: 2 }),
      { ...wholeTask(1, { slices: 3 }), kind: 'part', sliceFrom: 1, sliceTo: 3 },
      { ...wholeTask(2, { slices: 2 }), kind: 'assembly' },
      wholeTask(3, { slices: 1, acts: ['refuse'] }),
    ]);
    await run.compute();
    expect(await run.settle()).toBeUndefined();
    expect(queue.records.map(({ cpuUs, ...record }) => record)).toEqual([
      { index: 0, outcome: 'result', result: expect.objectContaining({ data: [Uint8Array.of(0, 1, 1, 1, 1, 1)] }) },
      { index: 1, outcome: 'payloads', payloads: [Uint8Array.of(1, 2, 1), Uint8Array.of(2, 2, 1)] },
      { index: 2, outcome: 'result', result: expect.objectContaining({ data: [Uint8Array.of(4, 5)] }) },
      { index: 3, outcome: 'failure', code: 'not-converged', text: 'slice 0 did not converge' },
    ]);
    expect(queue.calls).toEqual([['finish']]);
    expect(run.heartbeat()).toMatchObject({ fraction: 1 });
  });

  it('yields when its budget is used up, and gives the rest back', async () => {
    const queue = fakeQueue();
    const run = start(queue, [wholeTask(0, busy(40)), wholeTask(1, busy(40)), wholeTask(2, busy(40))], 5);
    await run.compute();
    await run.settle();
    expect(queue.records.map(({ index }) => index)).toEqual([0]);
    expect(queue.calls).toEqual([['finish']]);
  });

  it('drops a running slice when the answer to a record is cancel', async () => {
    const queue = fakeQueue(['cancel']);
    const run = start(queue, [wholeTask(0, busy(4)), wholeTask(1, { slices: 1, acts: ['spin'] })]);
    await run.compute();
    await run.settle();
    expect(queue.records.map(({ index }) => index)).toEqual([0]);
    expect(queue.calls).toEqual([['finish']]);
  });

  it('writes nothing more once its lease is lost', async () => {
    const queue = fakeQueue(['lost']);
    const run = start(queue, [wholeTask(0, busy(4)), wholeTask(1, { slices: 1, acts: ['spin'] })]);
    await run.compute();
    expect(await run.settle()).toBeUndefined();
    expect(queue.records).toEqual([]);
    expect(queue.calls).toEqual([]);
  });

  it('leaves the thread alone once its own tasks are computed', async () => {
    const queue = fakeQueue();
    const earlier = start(fakeQueue(), [wholeTask(0, { slices: 1 })]);
    await earlier.compute();
    const later = start(queue, [wholeTask(1, busy(4)), wholeTask(2, { slices: 1 })]);
    const computed = later.compute();
    earlier.obey('yield');
    earlier.obey('cancel');
    await computed;
    await later.settle();
    expect(queue.records.map(({ index }) => index)).toEqual([1, 2]);
  });

  it('keeps what was finished before a crash', async () => {
    const queue = fakeQueue();
    const run = start(queue, [wholeTask(0, busy(3)), wholeTask(1, { slices: 1, acts: ['trap'] })]);
    await run.compute();
    expect(await run.settle()).toBe('the kernel failed: unreachable');
    expect(queue.records.map(({ index }) => index)).toEqual([0]);
    expect(queue.calls).toEqual([['crash', 'the kernel failed: unreachable', true]]);
  });

  it('crashes in words when an input is missing or a record is refused', async () => {
    const queue = fakeQueue();
    const missing = start(queue, [{ ...wholeTask(0, { slices: 1 }), kernelDigest: 'gone' }]);
    await missing.compute();
    expect(await missing.settle()).toBe('kernel gone is not stored in this database');
    const refusing = fakeQueue([new Error('value too long')]);
    const refused = start(refusing, [wholeTask(0, { slices: 1 })]);
    await refused.compute();
    expect(await refused.settle()).toBe('results could not be recorded: value too long');
    expect(refusing.calls).toEqual([['crash', 'results could not be recorded: value too long', true]]);
  });

  it('ends a slice that never ends when the worker stops', async () => {
    const queue = fakeQueue();
    const run = start(queue, [wholeTask(0, busy(4)), wholeTask(1, { slices: 1, acts: ['spin'] })]);
    const computed = run.compute();
    await queue.recorded;
    run.stop('the worker stops');
    await computed;
    await run.settle();
    expect(queue.records.map(({ index }) => index)).toEqual([0]);
    expect(queue.calls).toEqual([['finish']]);
  });
});
