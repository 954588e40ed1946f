import { and, asc, getTableColumns, gt, ne, or, sql } from 'drizzle-orm';
import type { Queryable } from '../../client.ts';
import { workers } from '../../schema/workers.ts';

const busy = sql<number>`(select count(*) from leases l where l.worker = ${workers.id})`.mapWith(Number);

/** Workers that have not stopped, and those that stopped within the last day. */
export async function listWorkers(db: Queryable) {
  return db
    .select({ ...getTableColumns(workers), busy })
    .from(workers)
    .where(or(ne(workers.state, 'stopped'), gt(workers.stoppedAt, sql`now() - interval '1 day'`)))
    .orderBy(asc(workers.host), asc(workers.startedAt));
}

/** Slots of workers that take work now, how many are busy, and the most memory that one of them offers. */
export async function findCapacity(db: Queryable) {
  const [row] = await db
    .select({
      workers: sql`count(*)`.mapWith(Number),
      slots: sql`coalesce(sum(${workers.slots}), 0)`.mapWith(Number),
      busy: sql`coalesce(sum(${busy}), 0)`.mapWith(Number),
      memoryBytes: sql`coalesce(max(${workers.memoryBytes}), 0)`.mapWith(Number),
      /** Reference CPU per CPU, averaged over slots. */
      speed: sql`coalesce(sum(${workers.speedFactor} * ${workers.slots}) / sum(${workers.slots}), 1)`.mapWith(Number),
    })
    .from(workers)
    .where(and(sql`queue.may_work(${workers.id})`, gt(workers.heartbeatAt, sql`now() - interval '30 seconds'`)));
  return row ?? { workers: 0, slots: 0, busy: 0, memoryBytes: 0, speed: 1 };
}
