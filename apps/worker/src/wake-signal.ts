/** Lets slots sleep until there may be work. A wake while nobody sleeps is remembered for the next sleeper. */
export class WakeSignal {
  #sleepers = new Set<() => void>();
  #pending = false;

  wake(): void {
    if (this.#sleepers.size === 0) this.#pending = true;
    for (const wakeUp of this.#sleepers) wakeUp();
    this.#sleepers.clear();
  }

  /** Resolves at the next wake, or after about `timeoutMs` (spread by a quarter, so that workers do not poll in step). */
  sleep(timeoutMs: number): Promise<void> {
    if (this.#pending) {
      this.#pending = false;
      return Promise.resolve();
    }
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
