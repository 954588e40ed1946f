import { setImmediate as breathe } from 'node:timers/promises';
import type { PlannedJob } from '@nightcone/db';

/**
 * The distinct jobs of a sweep in order of their hashes, the order in which they are stored. Two points may be the same
 * job, e.g. where an axis varies what a choice does not use. Hashes are evenly spread: 256 small sorts with room between
 * them take the place of one that holds the event loop.
 */
export class SortedJobs {
  readonly #buckets = Array.from({ length: 256 }, () => new Map<string, PlannedJob>());

  add(job: PlannedJob): void {
    this.#buckets[Number.parseInt(job.hash.slice(0, 2), 16)]?.set(job.hash, job);
  }

  async inOrder(): Promise<PlannedJob[]> {
    const ordered: PlannedJob[] = [];
    for (const [index, bucket] of this.#buckets.entries()) {
      ordered.push(...[...bucket.values()].sort((a, b) => (a.hash < b.hash ? -1 : 1)));
      if (index % 16 === 15) await breathe();
    }
    return ordered;
  }
}
