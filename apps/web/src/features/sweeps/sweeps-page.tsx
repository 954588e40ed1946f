import { Link } from 'react-router-dom';
import { ButtonLink } from '../../components/button.tsx';
import { Clock, ExpectedClock } from '../../components/clock.tsx';
import { Page } from '../../components/page.tsx';
import { Pager } from '../../components/pager.tsx';
import { Empty } from '../../components/problem-note.tsx';
import { ProgressRuler } from '../../components/progress-ruler.tsx';
import { QueryView } from '../../components/query-view.tsx';
import { StateMark } from '../../components/state-mark.tsx';
import type { AnswerOf } from '../../lib/api.ts';
import { formatCount } from '../../lib/format-quantity.ts';
import { modelWords } from '../../lib/model-words.ts';
import { useApi } from '../../lib/query.ts';
import { useUrlState } from '../../lib/url-state.ts';
import { sweepProgress, sweepStateWord } from './sweep-state.ts';

type Row = AnswerOf<'listSweeps'>['rows'][number];

/** One's own sweeps, the newest first. */
export function Component() {
  const [url, change] = useUrlState<'cursor'>();
  const query = useApi('listSweeps', { query: url.cursor ? { cursor: url.cursor } : {} });
  return (
    <Page
      wide
      title="Sweeps"
      lead="A sweep is a set of jobs made by varying one or more parameters, submitted and watched together."
    >
      <div className="mt-4">
        <QueryView query={query} what="your sweeps">
          {(page) =>
            page.rows.length === 0 ? (
              <Empty
                title="No sweeps of yours yet"
                actions={
                  <ButtonLink to="/question" look="main">
                    New question
                  </ButtonLink>
                }
              >
                In New question every parameter has a small control that makes it an axis.
              </Empty>
            ) : (
              <>
                <ul className="border-hair border-t">
                  {page.rows.map((row) => (
                    <SweepRow key={row.id} row={row} />
                  ))}
                </ul>
                <Pager
                  shown={page.rows.length}
                  total={page.total}
                  word="sweep"
                  first={!url.cursor}
                  next={page.nextCursor}
                  go={(cursor) => change({ cursor })}
                />
              </>
            )
          }
        </QueryView>
      </div>
    </Page>
  );
}

function SweepRow({ row }: { row: Row }) {
  const progress = sweepProgress(row);
  return (
    <li className="grid grid-cols-[minmax(0,1fr)_auto] items-center gap-x-6 gap-y-1 border-hair border-b py-2.5 text-small md:grid-cols-[7.5rem_minmax(10rem,1.5fr)_minmax(8rem,1fr)_9rem_9rem]">
      <span className="max-md:order-2">
        <StateMark state={sweepStateWord(row)} />
      </span>
      <span className="min-w-0 max-md:order-1">
        <Link to={`/sweeps/${row.id}`} className="link font-semibold">
          {row.title}
        </Link>
        <span className="block text-ink3">{modelWords(row.model)}</span>
      </span>
      <span className="min-w-0 max-md:order-3 max-md:col-span-2">
        <ProgressRuler progress={progress} unit="jobs" />
      </span>
      <span className="num max-md:order-4 md:text-right">
        {formatCount(progress.done)} of {formatCount(progress.total)} jobs
      </span>
      <span className="text-right max-md:order-5">
        {row.submission.finishedAt ? (
          <Clock at={row.submission.finishedAt} />
        ) : row.submission.expectedEnd ? (
          <ExpectedClock expected={row.submission.expectedEnd} />
        ) : (
          <span className="text-ink3">
            asked <Clock at={row.createdAt} />
          </span>
        )}
      </span>
    </li>
  );
}
