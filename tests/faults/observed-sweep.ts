import type { TestDatabase } from '@nightcone/db/testing';
import type { Watch } from '../../apps/worker/src/testing/until.ts';

export interface PartRow {
  index: number;
  worker: string;
  attempt: number;
  outcome: string;
}

/** A submission as the tables show it. */
export class ObservedSweep {
  constructor(
    private readonly database: TestDatabase,
    private readonly watch: Watch,
    private readonly submission: string,
  ) {}

  async parts(): Promise<PartRow[]> {
    const { rows } = await this.database.pool.query<PartRow>(
      'select index, worker, attempt, outcome from parts where submission_id = $1 order by index',
      [this.submission],
    );
    return rows;
  }

  /** Resolves when so many parts are recorded and chunks of the sweep are running. */
  underWay(parts: number): Promise<PartRow[]> {
    return this.watch.until(`${parts} parts are recorded and more are running`, async () => {
      const { rowCount } = await this.database.pool.query('select from leases where submission_id = $1', [
        this.submission,
      ]);
      const recorded = await this.parts();
      return recorded.length >= parts && (rowCount ?? 0) > 0 && recorded;
    });
  }

  /** Its state, when it has ended. */
  ended(timeoutMs = 60_000): Promise<string> {
    return this.watch.until(
      'the sweep has ended',
      async () => {
        const { rows } = await this.database.pool.query<{ state: string }>(
          'select state from submissions where id = $1 and finished_at is not null',
          [this.submission],
        );
        return rows[0]?.state ?? null;
      },
      timeoutMs,
    );
  }

  /** Everything that may be left behind by a fault: all must be zero when the sweep has ended. */
  async leftOver(): Promise<Record<string, number>> {
    const { rows } = await this.database.pool.query<Record<string, number>>(
      `select (select count(*)::int from leases) as leases,
              (select count(*)::int from chunks where state = 'open') as "openChunks",
              (select count(*)::int from pgboss.job where name like 'chunk%' and state < 'completed') as tickets,
              (select coalesce(sum(running), 0)::int from turns) as "runningSlots",
              (select coalesce(sum(reserved_ms), 0)::int from quota_balances) as "reservedMs",
              (select count(*)::int from executions where state = 'running') as "runningExecutions",
              (select count(*)::int from (select submission_id, index from parts group by 1, 2 having count(*) > 1) twice) as "partsTwice",
              (select count(*)::int from submissions s where s.used_us <>
                (select sum(round(p.cpu_us * p.speed_factor)) from parts p where p.submission_id = s.id)) as "wrongCharges"`,
    );
    return rows[0] as Record<string, number>;
  }
}

export const nothing = {
  leases: 0,
  openChunks: 0,
  tickets: 0,
  runningSlots: 0,
  reservedMs: 0,
  runningExecutions: 0,
  partsTwice: 0,
  wrongCharges: 0,
};
