import type { KernelInstance } from '@nightcone/kernel';
import { RecentMap } from '../recent-map.ts';
import type { ThreadJob } from './messages.ts';

/** Kernel instances of one thread. They hold memory that never shrinks, so only the last two are kept. */
export class KernelShelf {
  readonly #instances = new RecentMap<string, KernelInstance>(2);
  #open: { instance: KernelInstance; hash: string } | undefined;

  constructor(private readonly instantiate: (module: WebAssembly.Module) => KernelInstance) {}

  /** The job's kernel with the job open in it; consecutive tasks of one job find it open already. */
  open(job: ThreadJob): KernelInstance {
    const instance = this.#instances.get(job.kernel) ?? this.instantiate(job.module);
    this.#instances.set(job.kernel, instance);
    if (this.#open?.instance === instance && this.#open.hash === job.hash) return instance;
    this.#open = undefined;
    instance.open(JSON.parse(job.specification), job.tables);
    this.#open = { instance, hash: job.hash };
    return instance;
  }

  /** After a trap nothing is known of the instance's memory; after a large job it is too much to keep. */
  discard(digest: string): void {
    this.#instances.delete(digest);
    this.#open = undefined;
  }
}
