import type { QueueMessage } from '@nightcone/db';

/** Fans out what one LISTEN connection hears to everybody in this process who wants to know. */
export class Changes {
  readonly #listeners = new Set<(message: QueueMessage) => void>();

  tell(message: QueueMessage): void {
    for (const listener of this.#listeners) listener(message);
  }

  /** Returns the way to stop. */
  onChange(listener: (message: QueueMessage) => void): () => void {
    this.#listeners.add(listener);
    return () => this.#listeners.delete(listener);
  }

  get listeners(): number {
    return this.#listeners.size;
  }
}
