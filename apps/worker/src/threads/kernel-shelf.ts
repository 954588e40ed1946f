import type { KernelInstance } from '@nightcone/kernel';
import type { ThreadJob } from './messages.ts';

/** Modules and instances of one thread. Instances hold memory that never shrinks, so only the last few are kept. */
export class KernelShelf {
  readonly #modules = new Map<string, WebAssembly.Module>();
  readonly #instances = new Map<string, KernelInstance>();
  #open: { kernel: string; hash: string } | undefined;

  constructor(
    private readonly instantiate: (module: WebAssembly.Module) => KernelInstance,
    private readonly size = 2,
  ) {}

  addModule(digest: string, module: WebAssembly.Module): void {
    this.#modules.set(digest, module);
  }

  /** The job's kernel with the job open in it; consecutive tasks of one job find it open already. */
  open(job: ThreadJob): KernelInstance {
    const kernel = this.#instance(job.kernel);
    if (this.#open?.kernel === job.kernel && this.#open.hash === job.hash) return kernel;
    this.#open = undefined;
    kernel.open(job.specification, job.tables);
    this.#open = { kernel: job.kernel, hash: job.hash };
    return kernel;
  }

  /** After a trap nothing is known of the instance's memory. */
  discard(digest: string): void {
    this.#instances.delete(digest);
    if (this.#open?.kernel === digest) this.#open = undefined;
  }

  #instance(digest: string): KernelInstance {
    const module = this.#modules.get(digest);
    if (!module) throw new Error(`kernel ${digest} was not sent to this thread`);
    const instance = this.#instances.get(digest) ?? this.instantiate(module);
    // Map keeps insertion order: re-inserting makes this one the most recently used.
    this.#instances.delete(digest);
    this.#instances.set(digest, instance);
    for (const oldest of this.#instances.keys()) {
      if (this.#instances.size <= this.size) break;
      this.discard(oldest);
    }
    return instance;
  }
}
