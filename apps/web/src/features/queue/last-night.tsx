import type { LastNight } from '@nightcone/contracts';
import { Link } from 'react-router-dom';
import { Quantity } from '../../components/quantity.tsx';
import { Facts, MarginEntry } from '../../components/sheet.tsx';
import { Mark } from '../../components/state-mark.tsx';
import { formatCount, plural } from '../../lib/format-quantity.ts';
import { formatCpu } from '../../lib/format-time.ts';
import { modelWords } from '../../lib/model-words.ts';
import { SmallSweepPlot } from './small-sweep-plot.tsx';

type Row = LastNight['rows'][number];
/** Small plots are drawn for the first few; the rest are lines. */
const plotted = 3;

export function LastNightSheet({ report }: { report: LastNight }) {
  const total = report.finished + report.failed;
  return (
    <section aria-labelledby="last-night">
      <div className="flex flex-wrap items-baseline gap-x-4">
        <h2 id="last-night">Last night</h2>
        <p className="text-ink2">
          {total === 0
            ? 'Nothing of yours ran.'
            : `${plural(report.sweeps, 'sweep')}, ${plural(total, 'job')}: ${formatCount(report.finished)} finished, ${formatCount(report.failed)} failed.`}
        </p>
      </div>
      <ul className="mt-3 grid gap-x-8 gap-y-6 sm:grid-cols-2 xl:grid-cols-3">
        {report.rows.map((row, index) => (
          <NightRow key={row.sweepId ?? row.jobHash ?? row.title} row={row} plot={index < plotted} />
        ))}
      </ul>
    </section>
  );
}

function NightRow({ row, plot }: { row: Row; plot: boolean }) {
  const to = row.sweepId ? `/sweeps/${row.sweepId}` : row.jobHash ? `/jobs/${row.jobHash}` : '/jobs';
  return (
    <li className="min-w-0">
      <h3 className="truncate" title={row.title}>
        {row.title}
      </h3>
      <p className="text-ink3 text-small">{modelWords(row.model)}</p>
      {plot && row.sweepId ? <SmallSweepPlot sweepId={row.sweepId} /> : null}
      <p className="mt-1 flex items-center justify-between gap-3 text-small">
        <span className="inline-flex items-center gap-2">
          <Mark shape={row.failed > 0 ? 'cross' : 'square'} />
          {row.failed > 0
            ? `${formatCount(row.failed)} of ${formatCount(row.total)} failed`
            : `${formatCount(row.finished)} of ${plural(row.total, 'job')}`}
        </span>
        <Link to={to} className="link" aria-label={`Read: ${row.title}`}>
          Read
        </Link>
      </p>
    </li>
  );
}

export function LastNightMargin({ report }: { report: LastNight }) {
  const [first] = report.failures;
  return (
    <>
      {report.failures.map((failure) => (
        <MarginEntry
          key={`${failure.code} ${failure.sweepId}`}
          title={
            failure === first ? `Why ${plural(failure.points, 'point')} failed` : plural(failure.points, 'more point')
          }
        >
          <p className="mt-1 text-small">{failure.text}</p>
          {failure.sweepId ? (
            <p className="mt-1.5 text-small">
              <Link to={`/sweeps/${failure.sweepId}#failed`} className="link">
                See the failed points
              </Link>
            </p>
          ) : null}
        </MarginEntry>
      ))}
      {report.finished + report.failed > 0 ? (
        <MarginEntry title="The night in numbers">
          <Facts
            rows={[
              {
                name: 'largest residual',
                value:
                  report.largestResidualEv === null ? (
                    'none'
                  ) : (
                    <Quantity value={report.largestResidualEv} unit="eV" small />
                  ),
              },
              {
                name: 'closed-form checks',
                value: `${formatCount(report.checksHeld)} of ${formatCount(report.checksMade)} hold`,
              },
              { name: 'CPU used', value: formatCpu(report.usedMs) },
              { name: 'returned to quota', value: formatCpu(report.returnedMs) },
            ]}
          />
        </MarginEntry>
      ) : null}
    </>
  );
}
