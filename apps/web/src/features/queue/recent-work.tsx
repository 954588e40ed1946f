import type { Submission } from '@nightcone/contracts';
import { Link } from 'react-router-dom';
import { Clock } from '../../components/clock.tsx';
import { StateMark } from '../../components/state-mark.tsx';
import { formatCount } from '../../lib/format-quantity.ts';
import { addressOfWork } from './work-state.ts';

const shown = 5;
const recentMs = 24 * 3_600_000;

/** One's own work that ended within a day, the newest first, without what last night's report tells anyway. */
export function recentlyEnded(
  rows: readonly Submission[],
  told: readonly Pick<Submission, 'sweepId' | 'jobHash'>[],
  now: number,
): Submission[] {
  const addresses = new Set(told.map(addressOfWork));
  return rows
    .filter((row) => row.finishedAt !== null && now - Date.parse(row.finishedAt) < recentMs)
    .filter((row) => !addresses.has(addressOfWork(row)))
    .sort((a, b) => (b.finishedAt ?? '').localeCompare(a.finishedAt ?? ''))
    .slice(0, shown);
}

export function RecentWork({ rows }: { rows: readonly Submission[] }) {
  return (
    <section aria-labelledby="recent-work" className="mt-5">
      <h3 id="recent-work">Ended today</h3>
      <ul className="mt-1">
        {rows.map((row) => (
          <li
            key={row.id}
            className="grid grid-cols-[minmax(0,1fr)_auto] items-baseline gap-x-5 gap-y-0.5 border-hair border-b py-[7px] text-small last:border-b-0 sm:grid-cols-[6.5rem_minmax(9rem,1fr)_9rem_6rem]"
          >
            <span className="max-sm:order-2 max-sm:text-right">
              <StateMark
                state={row.state === 'cancelled' ? 'cancelled' : row.progress.failed > 0 ? 'failed' : 'finished'}
              />
            </span>
            <span className="min-w-0 max-sm:order-1 sm:truncate">
              <Link to={addressOfWork(row) ?? '/jobs'} className="link font-semibold" title={row.title}>
                {row.title}
              </Link>
            </span>
            <span className="num max-sm:order-3 sm:text-right">
              {formatCount(row.progress.done)} of {formatCount(row.progress.total)} {row.unit}
            </span>
            <span className="text-right max-sm:order-4">{row.finishedAt ? <Clock at={row.finishedAt} /> : null}</span>
          </li>
        ))}
      </ul>
    </section>
  );
}
