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

/** What was computed between two instants, in bins of equal length, from the records of finished parts. */
export async function listPastWork(db: Queryable, from: Date, to: Date, binMinutes: number): Promise<PastWork[]> {
  const bin = `${binMinutes} minutes`;
  const { rows } = await db.execute<Record<keyof PastWork, unknown>>(sql`
    select p.submission_id as "submissionId", s.account_id as "accountId", s.title,
           extract(epoch from date_bin(${bin}::interval, p.at, ${from.toISOString()}::timestamptz)) * 1000 as "from",
           sum(p.cpu_us) / 1000.0 as "busyMs"
      from parts p join submissions s on s.id = p.submission_id
     where p.at >= ${from.toISOString()} and p.at < ${to.toISOString()}
     group by 1, 2, 3, 4 order by 4, 1`);
  return rows.map((row) => ({
    submissionId: row.submissionId as string,
    accountId: row.accountId as string,
    title: row.title as string,
    from: new Date(Number(row.from)),
    busyMs: Number(row.busyMs),
  }));
}
