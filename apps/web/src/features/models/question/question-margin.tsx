import type { ReactNode } from 'react';
import { HashMark } from '../../../components/hash-comb.tsx';
import { Facts, MarginEntry } from '../../../components/sheet.tsx';
import { formatBytes, formatCount } from '../../../lib/format-quantity.ts';
import { formatCpu, formatMoment, formatUncertainty } from '../../../lib/format-time.ts';
import { useTimeZone } from '../../../lib/session.ts';
import { NoteWords } from './control-row.tsx';
import type { QuestionNote } from './question-context.ts';
import type { EstimateState } from './use-estimate.ts';

/** Validity of all points, each with the letter that stands at its line. */
export function ValidityEntry({ notes, whole }: { notes: readonly QuestionNote[]; whole: boolean }) {
  return (
    <div className="hidden margin:block">
      <MarginEntry title="Validity">
        {notes.length === 0 ? (
          <p className="mt-1 text-ink2 text-small">
            {whole ? 'Inside the range of the model everywhere.' : 'Nothing to say at the previewed point.'}
          </p>
        ) : (
          <ul aria-live="polite">
            {notes.map((note) => (
              <li key={note.key} className="mt-2 flex gap-2.5 text-small">
                <i aria-hidden="true" className="symbol w-3 shrink-0 font-semibold">
                  {note.letter}
                </i>
                <span className="min-w-0">
                  <NoteWords note={note} />
                </span>
              </li>
            ))}
          </ul>
        )}
      </MarginEntry>
    </div>
  );
}

/** Size, cost and what is left of the week's quota. The lines keep their places while a newer estimate is on its way. */
export function CostEntry({ state }: { state: EstimateState }) {
  const { estimate, current, problem } = state;
  const value = (text: string | null | undefined | false): ReactNode => (
    <span className={current ? '' : 'text-ink3'}>{text || '…'}</span>
  );
  const quota = estimate?.quota;
  return (
    <MarginEntry title="Cost">
      <Facts
        rows={[
          {
            name: 'jobs × slices',
            value: value(
              estimate &&
                `${formatCount(estimate.jobs)} × ${formatCount(Math.round(estimate.slices / Math.max(1, estimate.jobs)))}`,
            ),
          },
          {
            name: 'already computed',
            value: value(estimate && `${formatCount(estimate.alreadyComputed)} of ${formatCount(estimate.jobs)}`),
          },
          { name: 'results', value: value(estimate && formatBytes(estimate.resultBytes)) },
          { name: 'CPU', value: value(estimate && formatCpu(estimate.cpuMs)) },
          {
            name: 'quota after',
            value: value(quota && `${formatCpu(quota.afterMs)} of ${formatCpu(quota.grantedMs)}`),
          },
        ]}
      />
      {quota ? <QuotaBar quota={quota} /> : null}
      {quota && !quota.fits ? (
        <p className="mt-2 text-small">
          <b>Over the quota.</b> Fewer points, a smaller grid, or an admin’s grant would fit.
        </p>
      ) : null}
      {problem ? (
        <p role="status" className="mt-2 text-small">
          <b>No estimate.</b> {problem.message}
        </p>
      ) : null}
    </MarginEntry>
  );
}

/** Used and reserved in ink, this question outlined, the rest of the week's grant empty. */
function QuotaBar({ quota }: { quota: NonNullable<EstimateState['estimate']>['quota'] }) {
  const part = (ms: number) => `${Math.min(100, Math.max(0, (100 * ms) / Math.max(1, quota.grantedMs)))}%`;
  const before = quota.usedMs + quota.reservedMs;
  return (
    <div aria-hidden="true" className="relative mt-2 h-3 border-rule border-b">
      <span className="absolute inset-y-0 left-0 bg-ink" style={{ width: part(before) }} />
      <span
        className="absolute inset-y-0 border border-ink bg-otherlt"
        style={{ left: part(before), width: part(Math.max(0, quota.grantedMs - quota.afterMs - before)), minWidth: 5 }}
      />
      <span className="absolute inset-y-0 right-0 border-rule border-r" />
    </div>
  );
}

export function FinishEntry({ state }: { state: EstimateState }) {
  const zone = useTimeZone();
  const finish = state.estimate?.finish;
  const text = (expected: { at: string; plusMinusS: number } | null | undefined) =>
    expected
      ? `${formatMoment(expected.at, zone)} ${formatUncertainty(expected.plusMinusS)}`
      : finish
        ? 'not known'
        : '…';
  return (
    <MarginEntry title="Expected finish">
      <Facts
        rows={[
          { name: 'submitted for tonight', value: text(finish?.tonight) },
          { name: 'submitted now', value: text(finish?.now) },
        ]}
      />
    </MarginEntry>
  );
}

/** The hash as it forms, of the point that is previewed. */
export function HashEntry({ hash, place, remark }: { hash: string | null; place: string; remark: string }) {
  return (
    <MarginEntry title={place ? `Job hash at ${place}` : 'Job hash'}>
      <div className="mt-2 min-h-14">
        {hash ? <HashMark hash={hash} what="job hash" radius={25} /> : <p className="text-ink3 text-small">…</p>}
        <p className="mt-1 text-ink2 text-small">{remark}</p>
      </div>
    </MarginEntry>
  );
}
