import type { Chunk, Queue } from '@nightcone/db/queue';

/** Fetches chunks for all slots of a process, one at a time: together they never promise more memory than there is. */
export class ChunkSource {
  #turn: Promise<unknown> = Promise.resolve();
  #usedBytes = 0;

  constructor(private readonly queue: Pick<Queue, 'next' | 'worker'>) {}

  /** `express`: only what is quickly done. */
  next(express: boolean): Promise<Chunk | null> {
    const mine = this.#turn.then(() => this.#next(express));
    this.#turn = mine.catch(() => {});
    return mine;
  }

  /** The memory of a chunk is free again. */
  release(chunk: Chunk): void {
    this.#usedBytes -= chunk.memoryBytes;
  }

  async #next(express: boolean): Promise<Chunk | null> {
    const memoryBytes = Math.max(0, this.queue.worker.memoryBytes - this.#usedBytes);
    const chunk = await this.queue.next({ express, memoryBytes });
    if (chunk) this.#usedBytes += chunk.memoryBytes;
    return chunk;
  }
}
