import type { Sweep } from '@nightcone/contracts';
import { Clock, ExpectedClock } from '../../components/clock.tsx';
import { Facts, MarginEntry } from '../../components/sheet.tsx';
import { formatCount, plural } from '../../lib/format-quantity.ts';
import { formatCpu } from '../../lib/format-time.ts';
import { SymbolText } from '../../plots/symbol-text.tsx';
import { type AxisName, valueWords } from './point-values.ts';
import { sweepProgress } from './sweep-state.ts';

/** Beside the progress: what is done of what, at which rate, until when, and what it costs. */
export function ProgressEntry({ sweep, now }: { sweep: Sweep; now: number }) {
  const { submission } = sweep;
  const { done, running, failed, total } = sweepProgress(sweep);
  const since = submission.startedAt ? now - Date.parse(submission.startedAt) : 0;
  const rate = submission.state === 'active' && since > 0 && done > 0 ? (done * 60_000) / since : null;
  const reused = sweep.counts.reused ?? 0;
  return (
    <MarginEntry level="major" title="How far">
      <Facts
        rows={[
          { name: 'done', value: `${formatCount(done)} of ${formatCount(total)}` },
          ...(reused > 0 ? [{ name: 'of these known before', value: formatCount(reused) }] : []),
          ...(running > 0 ? [{ name: 'running', value: formatCount(running) }] : []),
          ...(failed > 0 ? [{ name: 'failed', value: formatCount(failed) }] : []),
          ...(rate === null
            ? []
            : [{ name: 'rate', value: `${rate >= 10 ? rate.toFixed(0) : rate.toFixed(1)} jobs/min` }]),
          submission.finishedAt
            ? { name: 'ended', value: <Clock at={submission.finishedAt} /> }
            : {
                name: 'expected end',
                value: submission.expectedEnd ? <ExpectedClock expected={submission.expectedEnd} /> : 'not known',
              },
        ]}
      />
      {submission.why ? <p className="mt-1 text-ink2 text-small">{submission.why}</p> : null}
    </MarginEntry>
  );
}

export function CostEntry({ sweep: { submission } }: { sweep: Sweep }) {
  return (
    <MarginEntry title="Cost">
      <Facts
        rows={[
          { name: 'used', value: formatCpu(submission.usedMs) },
          { name: 'estimated', value: formatCpu(submission.estimatedMs) },
          { name: 'still reserved', value: formatCpu(Math.max(0, submission.reservedMs)) },
        ]}
      />
    </MarginEntry>
  );
}

export function AxesEntry({ sweep, names }: { sweep: Sweep; names: AxisName[] }) {
  let place = 0;
  return (
    <MarginEntry title={sweep.axes.length === 1 ? 'Axis' : 'Axes'}>
      <Facts
        rows={sweep.axes.flatMap((axis) =>
          axis.pointers.map((pointer, column) => {
            const name = names[place++] as AxisName;
            const first = axis.values[0]?.[column] ?? null;
            const last = axis.values.at(-1)?.[column] ?? null;
            return {
              key: pointer,
              name: (
                <>
                  {name.symbol ? <SymbolText tex={name.symbol} /> : null} {name.title}
                </>
              ),
              value: `${valueWords(first, '')} … ${valueWords(last, name.unit)} / ${axis.values.length}`,
            };
          }),
        )}
      />
      <p className="mt-1 text-ink3 text-least">{plural(sweep.points, 'point')}; the last axis runs fastest.</p>
    </MarginEntry>
  );
}
