import type { Order, PartRecord } from '@nightcone/db/queue';

const writeEveryMs = 1000;
const writeEveryParts = 500;
const writeEveryBytes = 32 * 2 ** 20;

export interface RecorderOptions {
  write(records: PartRecord[]): Promise<Order>;
  /** The answer to every write. */
  onOrder(order: Order): void;
  /** A write was refused for a reason that repeating does not mend; nothing more is written. */
  onFailure(error: unknown): void;
}

/** Gathers the records of a chunk and writes them in few statements: one a second, or when there are many. */
export class Recorder {
  #waiting: PartRecord[] = [];
  #bytes = 0;
  #writing: Promise<void> | undefined;
  #writtenAt = performance.now();
  #timer: NodeJS.Timeout | undefined;
  #failed = false;

  constructor(private readonly options: RecorderOptions) {}

  add(records: PartRecord[]): void {
    this.#waiting.push(...records);
    for (const record of records) this.#bytes += bytesOf(record);
    this.#schedule();
  }

  /** Resolves when everything is written, or nothing can be. */
  async drain(): Promise<void> {
    clearTimeout(this.#timer);
    while (this.#writing || (this.#waiting.length > 0 && !this.#failed)) await this.#write();
  }

  #schedule(): void {
    if (this.#writing || this.#failed || this.#waiting.length === 0) return;
    const dueIn = this.#writtenAt + writeEveryMs - performance.now();
    if (dueIn <= 0 || this.#waiting.length >= writeEveryParts || this.#bytes >= writeEveryBytes) void this.#write();
    else this.#timer ??= setTimeout(() => void this.#write(), dueIn);
  }

  /** One write at a time: what comes meanwhile goes with the next one. Never rejects. */
  #write(): Promise<void> {
    clearTimeout(this.#timer);
    this.#timer = undefined;
    this.#writing ??= this.#writeWaiting().finally(() => {
      this.#writing = undefined;
      this.#schedule();
    });
    return this.#writing;
  }

  async #writeWaiting(): Promise<void> {
    const records = this.#waiting.splice(0, writeEveryParts);
    if (records.length === 0 || this.#failed) return;
    for (const record of records) this.#bytes -= bytesOf(record);
    this.#writtenAt = performance.now();
    try {
      this.options.onOrder(await this.options.write(records));
    } catch (error) {
      this.#failed = true;
      this.options.onFailure(error);
    }
  }
}

function bytesOf(record: PartRecord): number {
  if (record.outcome === 'failure') return 0;
  const buffers = record.outcome === 'payloads' ? record.payloads : record.result.data;
  return buffers.reduce((sum, buffer) => sum + buffer.byteLength, 0);
}
