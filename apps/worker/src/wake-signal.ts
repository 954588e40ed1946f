/** Lets slots sleep until there may be work. Nobody misses a wake that came after he last looked for work. */
export class WakeSignal {
  readonly #sleepers = new Set<() => void>();
  #wakes = 0;

  /** To be read before looking for work, and given to `sleep` when there was none. */
  get wakes(): number {
    return this.#wakes;
  }

  wake(): void {
    this.#wakes++;
    for (const wakeUp of this.#sleepers) wakeUp();
    this.#sleepers.clear();
  }

  /** Resolves at the next wake after `seen`, or after about `timeoutMs` (spread, so that workers do not poll in step). */
  sleep(seen: number, timeoutMs: number): Promise<void> {
    if (this.#wakes !== seen) return Promise.resolve();
    return new Promise((resolve) => {
      const wakeUp = () => {
        clearTimeout(timer);
        this.#sleepers.delete(wakeUp);
        resolve();
      };
      const timer = setTimeout(wakeUp, timeoutMs * (0.75 + Math.random() / 2));
      this.#sleepers.add(wakeUp);
    });
  }
}
