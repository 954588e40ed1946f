import {
  createDb,
  createPool,
  type Db,
  findOptionalCurrentKernel,
  findOptionalKernelBytes,
  findOptionalTable,
  retry,
} from '@nightcone/db';

/** What the worker reads besides its queue. Every call waits for a database that is away. */
export class Database {
  readonly #pool: ReturnType<typeof createPool>;
  readonly #db: Db;

  constructor(
    url: string,
    private readonly onError: (error: Error) => void,
  ) {
    this.#pool = createPool(url, { max: 1, onError });
    this.#db = createDb(this.#pool);
  }

  async currentKernel(): Promise<string | undefined> {
    const kernel = await this.#patiently(() => findOptionalCurrentKernel(this.#db));
    return kernel?.digest;
  }

  kernelBytes(digest: string): Promise<Uint8Array | undefined> {
    return this.#patiently(() => findOptionalKernelBytes(this.#db, digest));
  }

  table(digest: string): ReturnType<typeof findOptionalTable> {
    return this.#patiently(() => findOptionalTable(this.#db, digest));
  }

  close(): Promise<void> {
    return this.#pool.end();
  }

  #patiently<T>(query: () => Promise<T>): Promise<T> {
    return retry(() => query().catch(throwCause), this.onError);
  }
}

/** drizzle wraps what the driver said in the text of the statement: what matters here is the former. */
function throwCause(error: unknown): never {
  throw error instanceof Error && error.cause instanceof Error ? error.cause : error;
}
