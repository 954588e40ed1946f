import type pg from 'pg';
import PgBoss from 'pg-boss';
import { createPool } from './client.ts';
import { listen, type QueueMessage } from './queries/events/listen.ts';
import { beatLeases } from './queries/queue/beat-leases.ts';
import { claimChunk } from './queries/queue/claim-chunk.ts';
import { cleanUp } from './queries/queue/clean-up.ts';
import { closeChunk, closeDeadChunk, dropLease, reapLeases } from './queries/queue/close-chunk.ts';
import { cutChunk, type SlotOffer } from './queries/queue/cut-chunk.ts';
import { readPayloads } from './queries/queue/read-payloads.ts';
import { recordParts } from './queries/queue/record-parts.ts';
import { beatWorker, mayWork, noteKernels, registerWorker, stopWorker } from './queries/workers/register-worker.ts';
import type { Chunk, Heartbeat, Order, PartRecord, Task, WorkerDescription } from './queue-types.ts';
import { isTransient, retry } from './retry.ts';

export type { QueueMessage } from './queries/events/listen.ts';
export type { SlotOffer } from './queries/queue/cut-chunk.ts';
export * from './queue-types.ts';

const tickets = 'chunk';
const deadTickets = 'chunk-dead';

/** Time between heartbeats, and time without one after which a lease is taken away. */
export const heartbeatMs = 2_000;
export const leaseMs = 8_000;
const cleanUpMs = 3_600_000;

/** The ticket queues exist from the deploy step on: several processes that create one at the same time deadlock. */
export async function installTickets(connectionString: string): Promise<void> {
  const boss = new PgBoss({ connectionString, max: 2, supervise: false, schedule: false });
  boss.on('error', () => {});
  await boss.start();
  try {
    await boss.createQueue(deadTickets, { name: deadTickets, policy: 'standard' });
    await boss.createQueue(tickets, {
      name: tickets,
      policy: 'standard',
      retryLimit: 2,
      retryDelay: 1,
      retryBackoff: true,
      // a backstop: leases end attempts long before
      expireInSeconds: 86_000,
      deadLetter: deadTickets,
    });
  } finally {
    await boss.stop({ graceful: false, wait: true });
  }
}

/**
 * Statements of pg-boss that it does not await would end the process when the server restarts: they are repeated until
 * it answers. A fetch is never repeated, because its first copy may have been carried out.
 */
const repeating = (pool: pg.Pool, onError: (error: Error) => void): PgBoss.Db => ({
  executeSql: (text, values) =>
    /skip locked/i.test(text) ? pool.query(text, values) : retry(() => pool.query(text, values), onError),
});

export interface QueueOptions {
  connectionString: string;
  worker: WorkerDescription;
  /** Told about lost connections and other passing trouble; never thrown. */
  onError?: (error: Error) => void;
}

/**
 * The worker's side of the queue. One instance per process.
 * `next` → compute its tasks in order, `record` at most once a second or 500 parts, obey the orders → `finish` or `crash`.
 * `beat` every `heartbeatMs` for all running chunks, `reap` likewise.
 */
export class Queue {
  readonly worker: WorkerDescription;
  readonly #connectionString: string;
  readonly #onError: (error: Error) => void;
  readonly #pool: pg.Pool;
  readonly #boss: PgBoss;
  readonly #listeners = new Set<{ stop: () => Promise<void> }>();
  /** Leases of others are judged only after the database has answered for one whole lease time. */
  #troubleAt = Date.now();
  #cleanedAt = 0;

  constructor({ connectionString, worker, onError = () => {} }: QueueOptions) {
    this.worker = worker;
    this.#connectionString = connectionString;
    this.#onError = (error) => {
      this.#troubleAt = Date.now();
      onError(error);
    };
    this.#pool = createPool(connectionString, {
      max: worker.slots + 2,
      onError: this.#onError,
      queryTimeoutMs: 10_000,
    });
    this.#boss = new PgBoss({
      db: repeating(this.#pool, this.#onError),
      migrate: false,
      schedule: false,
      supervise: true,
      maintenanceIntervalSeconds: 300,
    });
    this.#boss.on('error', this.#onError);
  }

  /** Joins the database: the worker's row, the ticket queue. Waits for a database that is not there yet. */
  async start(): Promise<void> {
    await this.#repeat(() => registerWorker(this.#pool, this.worker));
    await this.#boss.start();
  }

  /**
   * The next work for a free slot, or null when there is none that this slot may take (then wait for a `work` message,
   * at most 2 s). Never throws for a lost connection: that is null too.
   * `express`: take only parts estimated at 10 s or less. `memoryBytes`: what this slot may still use.
   */
  async next(offer: SlotOffer): Promise<Chunk | null> {
    try {
      for (;;) {
        const chunk = await this.#transaction(async (client) => {
          const db = inTransaction(client);
          if (!(await mayWork(client, this.worker.id))) return null;
          let [ticket] = await this.#boss.fetch(tickets, { db });
          if (!ticket) {
            const id = await cutChunk(client, offer);
            if (!id) return null;
            // startAfter in the past: a ticket made in this transaction is otherwise not yet due in it
            await this.#boss.insert([{ id, name: tickets, startAfter: '-1' }], { db });
            [ticket] = await this.#boss.fetch(tickets, { db });
            if (!ticket) throw new Error('a chunk was cut, but its ticket could not be fetched');
          }
          const claimed = await claimChunk(client, ticket.id, this.worker);
          if (!claimed) await this.#boss.deleteJob(tickets, ticket.id, { db });
          return claimed ?? 'closed';
        });
        if (chunk !== 'closed') return chunk;
      }
    } catch (error) {
      if (!isTransient(error)) throw error;
      this.#onError(error as Error);
      return null;
    }
  }

  /**
   * Records finished tasks, once whatever happens: repeated until the database has answered. The answer is the order for
   * the chunk; `lost`: somebody else has it now, nothing was written, drop it.
   */
  record(chunk: Chunk, records: readonly PartRecord[]): Promise<Order> {
    return this.#repeat(() => recordParts(this.#pool, chunk, this.worker, records));
  }

  /** The recorded payloads of a job in slice order, for its assembly. */
  payloads(chunk: Chunk, task: Task): Promise<Uint8Array[]> {
    return this.#repeat(() => readPayloads(this.#pool, chunk.submissionId, task));
  }

  /**
   * Sign of life of this process and of its running chunks; an order for each. Empty when the database did not answer:
   * then go on, it is asked again.
   */
  async beat(heartbeats: readonly Heartbeat[]): Promise<Map<string, Order>> {
    try {
      await beatWorker(this.#pool, this.worker.id);
      return await beatLeases(this.#pool, heartbeats);
    } catch (error) {
      if (!isTransient(error)) throw error;
      this.#onError(error as Error);
      return new Map();
    }
  }

  /**
   * Ends an attempt in good order, after the last `record`: what was not recorded goes back to the backlog, or is
   * dropped when the submission is cancelled. Also for a yield and for a stop of the worker. False: the lease had ended
   * before, taken away or by this very call, whose answer was lost.
   */
  finish(chunk: Chunk): Promise<boolean> {
    return this.#repeat(() =>
      this.#transaction(async (client) => {
        if (!(await dropLease(client, chunk))) return false;
        await closeChunk(client, chunk.id);
        await this.#boss.deleteJob(tickets, chunk.id, { db: inTransaction(client) });
        return true;
      }),
    );
  }

  /**
   * Ends an attempt that broke (thread gone, trap, out of memory): the ticket comes back after a pause, and the next
   * attempt takes only the first part that was not recorded. After the third attempt that part is *broken off*.
   */
  crash(chunk: Chunk, reason: string, cpuUs: number): Promise<void> {
    return this.#repeat(() =>
      this.#transaction(async (client) => {
        if (await dropLease(client, chunk)) await this.#breakOff(client, chunk.id, reason, cpuUs);
      }),
    );
  }

  /** Takes the leases of workers that are silent and marks them so; how many leases. Every worker does it, every beat. */
  async reap(): Promise<number> {
    if (Date.now() - this.#troubleAt < leaseMs) return 0;
    try {
      if (Date.now() - this.#cleanedAt > cleanUpMs) {
        await cleanUp(this.#pool);
        this.#cleanedAt = Date.now();
      }
      return await this.#transaction(async (client) => {
        const lost = await reapLeases(client, leaseMs);
        for (const lease of lost) {
          await this.#breakOff(client, lease.chunkId, `worker ${lease.worker} fell silent`, lease.cpuUs);
        }
        return lost.length;
      });
    } catch (error) {
      if (!isTransient(error)) throw error;
      this.#onError(error as Error);
      return 0;
    }
  }

  /** Tells which kernels this process has loaded. */
  noteKernels(digests: readonly string[]): Promise<void> {
    return this.#repeat(() => noteKernels(this.#pool, this.worker.id, digests));
  }

  /** Messages until the queue is stopped; `connected` first and after every loss of the connection. */
  listen(onMessage: (message: QueueMessage) => void): void {
    this.#listeners.add(listen(this.#connectionString, onMessage, this.#onError));
  }

  /** Leaves the database. Chunks must be finished before. */
  async stop(): Promise<void> {
    await Promise.all([...this.#listeners].map((listener) => listener.stop()));
    await stopWorker(this.#pool, this.worker.id).catch(this.#onError);
    await this.#boss.stop({ graceful: false, wait: false });
    await this.#pool.end();
  }

  /** Machinery failed: the ticket decides between another attempt and the end. */
  async #breakOff(client: pg.PoolClient, chunkId: string, reason: string, cpuUs: number): Promise<void> {
    const db = inTransaction(client);
    await this.#boss.fail(tickets, chunkId, { message: reason }, { db });
    const ticket = await this.#boss.getJobById(tickets, chunkId, { db, includeArchive: false });
    const last = ticket?.state !== 'retry';
    await closeDeadChunk(client, { chunkId, reason, cpuUs, last });
    if (last) await this.#boss.deleteJob(tickets, chunkId, { db });
  }

  #repeat<T>(work: () => Promise<T>): Promise<T> {
    return retry(work, this.#onError);
  }

  async #transaction<T>(work: (client: pg.PoolClient) => Promise<T>): Promise<T> {
    const client = await this.#pool.connect();
    let broken: Error | undefined;
    try {
      await client.query('begin');
      const result = await work(client);
      await client.query('commit');
      return result;
    } catch (error) {
      // the state of this connection is not known: it is thrown away, and with it the transaction
      broken = error as Error;
      throw error;
    } finally {
      client.release(broken);
    }
  }
}

const inTransaction = (client: pg.ClientBase): PgBoss.Db => ({
  executeSql: (text, values) => client.query(text, values),
});
