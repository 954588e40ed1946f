/** What the worker process and one slice thread share without messages: an order, and the processor time used. */

/** `leave` drops the task in hand at the next slice, `yield` finishes it first. */
export const orders = { go: 0, yield: 1, leave: 2 } as const;
export type ThreadOrder = keyof typeof orders;

export class ControlBlock {
  readonly #order: Int32Array;
  readonly #cpuMs: Float64Array;

  constructor(readonly memory: SharedArrayBuffer = new SharedArrayBuffer(16)) {
    this.#order = new Int32Array(memory, 0, 1);
    this.#cpuMs = new Float64Array(memory, 8, 1);
  }

  /** Orders only grow stricter within a batch. */
  order(next: 'yield' | 'leave'): void {
    if (Atomics.load(this.#order, 0) < orders[next]) Atomics.store(this.#order, 0, orders[next]);
  }

  reset(): void {
    Atomics.store(this.#order, 0, orders.go);
    this.#cpuMs[0] = 0;
  }

  get mustYield(): boolean {
    return Atomics.load(this.#order, 0) >= orders.yield;
  }

  get mustLeave(): boolean {
    return Atomics.load(this.#order, 0) >= orders.leave;
  }

  /** Processor time of the batch in hand, as of its last finished slice. A torn read is impossible on 64-bit systems. */
  get cpuMs(): number {
    return this.#cpuMs[0] ?? 0;
  }

  set cpuMs(value: number) {
    this.#cpuMs[0] = value;
  }
}
