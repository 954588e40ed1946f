import { sql } from 'drizzle-orm';
import type { Queryable } from '../../client.ts';

export interface PastWork {
  submissionId: string;
  accountId: string;
  title: string;
  /** Start of a bin of `binMinutes`. */
  from: Date;
  /** CPU milliseconds on its workers (not reference CPU): divided by the bin's length these are slots. */
  busyMs: number;
}

/**
 * What was computed between two instants, in bins of equal length, from the records of finished parts. A record says when
 * a part ended and what CPU it took: it lay on a slot for at least that long before.
 */
export async function listPastWork(db: Queryable, from: Date, to: Date, binMinutes: number): Promise<PastWork[]> {
  const bin = sql`${`${binMinutes} minutes`}::interval`;
  const origin = sql`${from.toISOString()}::timestamptz`;
  const end = sql`${to.toISOString()}::timestamptz`;
  const { rows } = await db.execute<Record<keyof PastWork, unknown>>(sql`
    with done as (
      select p.submission_id, greatest(p.at - p.cpu_us * interval '1 microsecond', ${origin}) as start, least(p.at, ${end}) as stop
        from parts p where p.at > ${origin} and p.at - p.cpu_us * interval '1 microsecond' < ${end})
    select d.submission_id as "submissionId", s.account_id as "accountId", s.title,
           extract(epoch from b.bin) * 1000 as "from",
           sum(extract(epoch from least(d.stop, b.bin + ${bin}) - greatest(d.start, b.bin))) * 1000 as "busyMs"
      from done d join submissions s on s.id = d.submission_id,
           generate_series(date_bin(${bin}, d.start, ${origin}), d.stop, ${bin}) as b(bin)
     group by 1, 2, 3, 4 order by 4, 1`);
  return rows.map((row) => ({
    submissionId: row.submissionId as string,
    accountId: row.accountId as string,
    title: row.title as string,
    from: new Date(Number(row.from)),
    busyMs: Number(row.busyMs),
  }));
}
