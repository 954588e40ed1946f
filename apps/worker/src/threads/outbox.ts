import type { MessagePort } from 'node:worker_threads';
import type { CpuClock } from './cpu-clock.ts';
import type { Outcome, ThreadReport } from './messages.ts';

/** Small results travel together: a message every 50 ms is often enough for recording, and costs little. */
const postEveryMs = 50;

type Unmeasured = Outcome extends infer O ? (O extends Outcome ? Omit<O, 'cpuMs'> : never) : never;

/**
 * Gathers outcomes and shares the processor time since the last message among them by their elapsed times:
 * the thread's clock ticks more coarsely than a small job lasts, so single readings would charge 0 or a whole tick.
 */
export class Outbox {
  #waiting: { outcome: Unmeasured; elapsedMs: number }[] = [];
  #lastCpuMs: number;
  #lastAt = performance.now();
  #postedAt = performance.now();

  constructor(
    private readonly port: MessagePort,
    private readonly clock: CpuClock,
  ) {
    this.#lastCpuMs = clock.readMs();
  }

  add(outcome: Unmeasured): void {
    const now = performance.now();
    this.#waiting.push({ outcome, elapsedMs: now - this.#lastAt });
    this.#lastAt = now;
    this.postIfDue();
  }

  /** Also called from inside slices, so that a small result does not wait for the end of a long one. */
  postIfDue(): void {
    if (performance.now() - this.#postedAt >= postEveryMs) this.post();
  }

  post(): void {
    // an empty message is none: the first result after a quiet time goes at once, for a long slice may follow it
    if (this.#waiting.length === 0) return;
    this.#postedAt = performance.now();
    const cpuMs = this.clock.readMs();
    const used = cpuMs - this.#lastCpuMs;
    this.#lastCpuMs = cpuMs;
    const elapsed = this.#waiting.reduce((sum, { elapsedMs }) => sum + elapsedMs, 0);
    const outcomes = this.#waiting.map(({ outcome, elapsedMs }) => ({
      ...outcome,
      cpuMs: elapsed > 0 ? (used * elapsedMs) / elapsed : used / this.#waiting.length,
    })) as Outcome[];
    this.#waiting = [];
    const report: ThreadReport = { type: 'outcomes', outcomes };
    this.port.postMessage(report, buffersOf(outcomes));
  }
}

/** The buffers change hands; views of a larger buffer (a pool, a memory) are copied by the message instead. */
function buffersOf(outcomes: Outcome[]): ArrayBuffer[] {
  const buffers = new Set<ArrayBuffer>();
  const add = ({ buffer, byteLength }: Uint8Array) => {
    if (buffer instanceof ArrayBuffer && buffer.byteLength === byteLength) buffers.add(buffer);
  };
  for (const outcome of outcomes) {
    if (outcome.status === 'computed') outcome.payloads.forEach(add);
    if (outcome.status === 'assembled') outcome.result.data.forEach(add);
  }
  return [...buffers];
}
