import type { Submission } from '@nightcone/contracts';
import { Link } from 'react-router-dom';
import { ExpectedClock } from '../../components/clock.tsx';
import { ProgressRuler } from '../../components/progress-ruler.tsx';
import { StateMark } from '../../components/state-mark.tsx';
import { formatCount, plural } from '../../lib/format-quantity.ts';
import { modelWords } from '../../lib/model-words.ts';
import { addressOfWork, workState } from './work-state.ts';

/** Rows that wait and belong to others say nothing that one could act on: they are gathered. */
function gather(rows: readonly Submission[]) {
  const shown = rows.filter((row) => row.mine || workState(row) === 'running');
  const rest = rows.filter((row) => !shown.includes(row));
  const jobs = rest.reduce((sum, row) => sum + (row.unit === 'jobs' ? row.progress.total - row.progress.done : 1), 0);
  const people = [...new Set(rest.map((row) => row.owner.label))];
  return { shown, jobs, people };
}

export function OpenWork({ rows }: { rows: readonly Submission[] }) {
  const { shown, jobs, people } = gather(rows);
  if (rows.length === 0) {
    return <p className="py-2 text-ink2">Nothing runs and nothing waits: what you submit now starts at once.</p>;
  }
  return (
    <div className="[--work:6.5rem_minmax(9rem,1.1fr)_minmax(6rem,1fr)_8.5rem_8.5rem]">
      <div
        aria-hidden
        className="hidden grid-cols-(--work) gap-x-5 border-hair border-b pb-1.5 text-ink2 text-small sm:grid"
      >
        <span>state</span>
        <span>what</span>
        <span>progress</span>
        <span className="text-right">done</span>
        <span className="text-right">expected end</span>
      </div>
      <ul>
        {shown.map((row) => (
          <WorkRow key={row.id} row={row} />
        ))}
        {people.length > 0 ? (
          <li className="flex items-center gap-6 py-[7px] text-small">
            <StateMark state="waiting" />
            <span className="text-ink2">
              {people.join(', ')}: {plural(jobs, 'job')}
            </span>
          </li>
        ) : null}
      </ul>
    </div>
  );
}

function WorkRow({ row }: { row: Submission }) {
  const to = addressOfWork(row);
  const name = row.mine ? row.title : `${row.owner.label}, ${modelWords(row.model)}`;
  const state = workState(row);
  return (
    <li className="grid grid-cols-[minmax(0,1fr)_auto] items-center gap-x-5 gap-y-1 border-hair border-b py-[7px] text-small sm:grid-cols-(--work)">
      <span className="max-sm:order-2 max-sm:text-right">
        <StateMark state={state} />
      </span>
      <span className={`min-w-0 sm:truncate max-sm:order-1 ${row.mine ? 'font-semibold' : ''}`}>
        {row.mine && to ? (
          <Link to={to} className="link" title={name}>
            {name}
          </Link>
        ) : (
          name
        )}
      </span>
      <span className="min-w-0 max-sm:order-3 max-sm:col-span-2">
        <ProgressRuler progress={row.progress} unit={row.unit} mine={row.mine} />
      </span>
      <span className="num sm:whitespace-nowrap max-sm:order-4 sm:text-right">
        {formatCount(row.progress.done)} of {formatCount(row.progress.total)} {row.unit}
      </span>
      <span className="text-right max-sm:order-5">
        {row.expectedEnd ? <ExpectedClock expected={row.expectedEnd} /> : <span className="text-ink3">not known</span>}
      </span>
      {row.mine && row.why && state !== 'running' ? (
        <p className="text-ink3 text-least max-sm:order-6 max-sm:col-span-2 sm:col-span-4 sm:col-start-2">{row.why}</p>
      ) : null}
    </li>
  );
}
