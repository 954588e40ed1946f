import { ComputeThread } from './compute-thread.ts';

export interface PoolOptions {
  size: number;
  entry?: URL;
}

/** One compute thread per slot; a thread belongs to its slot, so a job cut in pieces finds its kernel open there. */
export class ThreadPool {
  readonly threads: readonly ComputeThread[];

  constructor({ size, entry = new URL('./slice-thread.ts', import.meta.url) }: PoolOptions) {
    this.threads = Array.from({ length: size }, () => new ComputeThread({ entry }));
  }

  async close(): Promise<void> {
    await Promise.all(this.threads.map((thread) => thread.close()));
  }
}
