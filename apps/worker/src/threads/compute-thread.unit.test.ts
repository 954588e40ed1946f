import { afterEach, beforeEach, describe, expect, it } from 'vitest';
import { type BatchEnd, ComputeThread } from './compute-thread.ts';
import type { Outcome, ThreadJob, ThreadTask } from './messages.ts';
import { type FakeParameters, spinningModule } from './testing/fake-kernel.ts';

const entry = new URL('./testing/fake-slice-thread.ts', import.meta.url);
let thread: ComputeThread;
beforeEach(() => {
  thread = new ComputeThread({ entry, heapMb: 64 });
});
afterEach(() => thread.close());

const jobOf = (hash: string, parameters: FakeParameters): ThreadJob => ({
  hash,
  kernel: 'k',
  module: spinningModule,
  specification: JSON.stringify({ model: 'fake', parameters, numerics: {} }),
  tables: new Map(),
});
const wholeJob = (id: number, parameters: FakeParameters): ThreadTask => ({
  id,
  kind: 'whole',
  job: jobOf(`j${id}`, parameters),
});

interface Run {
  end: Promise<BatchEnd>;
  outcomes: Outcome[];
  /** Resolves at the first progress report. */
  begun: Promise<void>;
}
function run(tasks: ThreadTask[]): Run {
  const outcomes: Outcome[] = [];
  let begin: () => void;
  const begun = new Promise<void>((resolve) => {
    begin = resolve;
  });
  const end = thread.run(tasks, { outcomes: (some) => void outcomes.push(...some), progress: () => begin() });
  return { end, outcomes, begun };
}

describe('a compute thread', { timeout: 20_000 }, () => {
  it('computes whole jobs, parts of a job and assemblies', async () => {
    const cut = jobOf('cut', { slices: 3 });
    const { end, outcomes } = run([
      wholeJob(0, { slices: 2 }),
      { id: 1, kind: 'part', job: cut, from: 1, to: 3 },
      { id: 2, kind: 'part', job: cut, from: 0, to: 1 },
      { id: 3, kind: 'assembly', job: cut, payloads: [Uint8Array.of(9), Uint8Array.of(8), Uint8Array.of(7)] },
    ]);
    expect(await end).toEqual({ kind: 'done' });
    expect(outcomes.map(({ cpuMs, ...outcome }) => outcome)).toEqual([
      { id: 0, status: 'assembled', result: expect.objectContaining({ data: [Uint8Array.of(0, 1, 1, 1, 1, 1)] }) },
      // The second and third task are of one job, which is opened once: both payloads carry the same count.
      { id: 1, status: 'computed', payloads: [Uint8Array.of(1, 2, 1), Uint8Array.of(2, 2, 1)] },
      { id: 2, status: 'computed', payloads: [Uint8Array.of(0, 2, 1)] },
      { id: 3, status: 'assembled', result: expect.objectContaining({ data: [Uint8Array.of(9, 8, 7)] }) },
    ]);
  });

  it('gives back a slice that never ends within two seconds of a stop, and is ready for the next batch', async () => {
    const { end, begun } = run([wholeJob(0, { slices: 2, acts: ['compute', 'spin'] })]);
    await begun;
    const stoppedAt = performance.now();
    thread.stop('cancel');
    expect(await end).toEqual({ kind: 'stopped', reason: 'cancel' });
    expect(performance.now() - stoppedAt).toBeLessThan(2000);
    const next = run([wholeJob(1, { slices: 1 })]);
    expect(await next.end).toEqual({ kind: 'done' });
    expect(next.outcomes).toHaveLength(1);
  });

  it('leaves a task between two slices when stopped, and the thread stays', async () => {
    const slices = 500;
    const { end, begun, outcomes } = run([wholeJob(0, { slices, acts: new Array(slices).fill('work-20-ms') })]);
    await begun;
    thread.stop('cancel');
    expect(await end).toEqual({ kind: 'stopped', reason: 'cancel' });
    expect(outcomes).toEqual([]);
    const next = run([wholeJob(1, { slices: 1 })]);
    await next.end;
    // A new instance, since the abandoned one is not trusted, but in the same thread.
    expect(next.outcomes[0]).toMatchObject({ result: { data: [Uint8Array.of(0, 1, 2)] } });
  });

  it('finishes the task in hand before it yields', async () => {
    const { end, begun, outcomes } = run([
      wholeJob(0, { slices: 20, acts: new Array(20).fill('work-20-ms') }),
      wholeJob(1, { slices: 1 }),
    ]);
    await begun;
    thread.yield();
    expect(await end).toEqual({ kind: 'yielded' });
    expect(outcomes.map(({ id }) => id)).toEqual([0]);
  });

  it('returns a refusal as an outcome and goes on', async () => {
    const { end, outcomes } = run([wholeJob(0, { slices: 1, acts: ['refuse'] }), wholeJob(1, { slices: 1 })]);
    expect(await end).toEqual({ kind: 'done' });
    expect(outcomes).toMatchObject([
      { id: 0, status: 'refused', code: 'not-converged', diagnostic: 'slice 0 did not converge' },
      { id: 1, status: 'assembled' },
    ]);
  });

  it.each([
    ['trap', 'the kernel failed: unreachable', 2],
    ['exit', 'the thread ended with code 7', 1],
  ] as const)(
    'reports a crash (%s), keeps what was finished before, and works again',
    async (act, message, instance) => {
      const { end, outcomes } = run([
        wholeJob(0, { slices: 3, acts: ['work-20-ms', 'work-20-ms', 'work-20-ms'] }),
        wholeJob(1, { slices: 1, acts: [act] }),
      ]);
      expect(await end).toEqual({ kind: 'crashed', message });
      expect(outcomes.map(({ id }) => id)).toEqual([0]);
      const next = run([wholeJob(2, { slices: 1 })]);
      expect(await next.end).toEqual({ kind: 'done' });
      // A trapped instance is not used again, a thread that has ended is started again.
      expect(next.outcomes[0]).toMatchObject({ result: { data: [Uint8Array.of(0, 1, instance)] } });
    },
  );

  it('survives a thread that exhausts its memory', async () => {
    const { end } = run([wholeJob(0, { slices: 1, acts: ['exhaust'] })]);
    expect(await end).toMatchObject({ kind: 'crashed', message: expect.stringContaining('memory') });
  });

  it('measures processor time of the batch in hand and shares it among the outcomes', async () => {
    const { end, outcomes } = run([
      wholeJob(0, { slices: 5, acts: new Array(5).fill('work-20-ms') }),
      wholeJob(1, { slices: 1 }),
    ]);
    await end;
    expect(thread.cpuSource).toBe(process.platform === 'linux' ? 'thread' : 'wall');
    const total = outcomes.reduce((sum, { cpuMs }) => sum + cpuMs, 0);
    // At least one scheduler tick, at most the elapsed 100 ms and a tick: other threads share these cores.
    expect(total).toBeGreaterThan(4);
    expect(total).toBeLessThan(150);
    expect(outcomes[0]?.cpuMs).toBeGreaterThan(outcomes[1]?.cpuMs ?? 0);
  });
});
