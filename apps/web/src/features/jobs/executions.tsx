import type { Execution } from '@nightcone/contracts';
import { Clock } from '../../components/clock.tsx';
import { HashComb, ShortHash } from '../../components/hash-comb.tsx';
import { ProgressRuler } from '../../components/progress-ruler.tsx';
import { StateMark } from '../../components/state-mark.tsx';
import { formatCpu } from '../../lib/format-time.ts';

const reasons = { first: 'first execution', 're-run': 're-run', audit: 'audit', restore: 'restored' };

/** Every time the job was carried out, and whether the bits agree with the first. */
export function Executions({ executions }: { executions: readonly Execution[] }) {
  return (
    <section aria-labelledby="executions" className="min-w-0">
      <h3 id="executions">Executions</h3>
      {executions.length === 0 ? <p className="py-1.5 text-ink2 text-small">Not carried out yet.</p> : null}
      <ul aria-live="polite">
        {executions.map((execution) => (
          <ExecutionRow key={execution.id} execution={execution} />
        ))}
      </ul>
    </section>
  );
}

function ExecutionRow({ execution }: { execution: Execution }) {
  const { state, bits, resultDigest, progress } = execution;
  return (
    <li className="border-hair border-b py-2 text-small last:border-b-0">
      <div className="flex flex-wrap items-center justify-between gap-x-4 gap-y-1">
        <span>
          {reasons[execution.reason]}, {execution.askedBy.label}
        </span>
        <StateMark state={bits ?? state}>{bits === 'first' ? 'first result' : (bits ?? undefined)}</StateMark>
      </div>
      <div className="flex flex-wrap items-center justify-between gap-x-4 gap-y-1 text-ink2">
        <span>
          {execution.finishedAt ? (
            <Clock at={execution.finishedAt} />
          ) : execution.startedAt ? (
            <>
              since <Clock at={execution.startedAt} />
            </>
          ) : (
            'not started'
          )}
          {execution.workers.length > 0 ? `, ${execution.workers.join(', ')}` : ''}
        </span>
        <span className="num">{formatCpu(execution.cpuMs)}</span>
      </div>
      {resultDigest ? (
        <div className="mt-1 flex items-center gap-2.5">
          <HashComb hash={resultDigest} radius={11} />
          <ShortHash hash={resultDigest} />
        </div>
      ) : state === 'running' ? (
        <div className="mt-1.5">
          <ProgressRuler progress={progress} unit="slices" height={10} />
        </div>
      ) : null}
      {execution.failure ? <p className="mt-1">{execution.failure.text}</p> : null}
      {execution.log.length > 0 ? (
        <details className="mt-1">
          <summary className="cursor-pointer py-0.5 text-ink2">Log</summary>
          <ol>
            {execution.log.map((line) => (
              <li key={`${line.at} ${line.text}`} className="flex gap-3 py-0.5">
                <Clock at={line.at} withDate={false} />
                <span className="min-w-0">{line.text}</span>
              </li>
            ))}
          </ol>
        </details>
      ) : null}
    </li>
  );
}
