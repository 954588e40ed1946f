import { type LoadedKernel, loadKernelBytes } from '@nightcone/kernel/node';
import { RecentMap } from '../../recent-map.ts';

/** A kernel cannot be used here: it is not stored, or its bytes are not the ones its name stands for. */
export class KernelUnavailable extends Error {
  override name = 'KernelUnavailable';
}

/** Kernels of this process by digest, fetched and compiled once, the last few kept. */
export class KernelStore {
  readonly #kernels = new RecentMap<string, Promise<LoadedKernel>>(8);

  constructor(
    private readonly fetchBytes: (digest: string) => Promise<Uint8Array | undefined>,
    /** Told every digest that has been loaded. */
    private readonly onLoaded: (digest: string) => void = () => {},
  ) {}

  load(digest: string): Promise<LoadedKernel> {
    const atHand = this.#kernels.get(digest);
    if (atHand) return atHand;
    const kernel = this.#fetch(digest);
    this.#kernels.set(digest, kernel);
    kernel.catch(() => this.#kernels.delete(digest));
    return kernel;
  }

  async #fetch(digest: string): Promise<LoadedKernel> {
    const bytes = await this.fetchBytes(digest);
    if (!bytes) throw new KernelUnavailable(`kernel ${digest} is not stored in this database`);
    const kernel = await loadKernelBytes(bytes);
    if (kernel.digest !== digest) {
      throw new KernelUnavailable(`the stored bytes of kernel ${digest} have the SHA-256 ${kernel.digest}`);
    }
    this.onLoaded(digest);
    return kernel;
  }
}
