import type { Sweep } from '@nightcone/contracts';
import { lazy, Suspense, useMemo } from 'react';
import { useParams } from 'react-router-dom';
import { Clock } from '../../components/clock.tsx';
import { NightStrip } from '../../components/night-strip.tsx';
import { Page } from '../../components/page.tsx';
import { Loading } from '../../components/problem-note.tsx';
import { ProgressRuler } from '../../components/progress-ruler.tsx';
import { QueryView } from '../../components/query-view.tsx';
import { SheetRow } from '../../components/sheet.tsx';
import { StateMark } from '../../components/state-mark.tsx';
import { useNight } from '../../components/use-night.ts';
import { useApi } from '../../lib/query.ts';
import { FailedPoints } from './failed-points.tsx';
import { PointMap } from './point-map.tsx';
import { axisNames } from './point-values.ts';
import { PointsTable } from './points-table.tsx';
import { SweepActions } from './sweep-actions.tsx';
import { AxesEntry, CostEntry, ProgressEntry } from './sweep-margin.tsx';
import { sweepProgress, sweepStateWord } from './sweep-state.ts';

const SweepPlot = lazy(async () => ({ default: (await import('../../plots/sweep-plot.tsx')).SweepPlot }));

/** One sweep: how far it is, its points as a map, its partial plot, and what failed. */
export function Component() {
  const { id = '' } = useParams();
  const query = useApi('getSweep', { params: { id } });
  if (!query.data) {
    return (
      <Page wide title="Sweep">
        <QueryView query={query} what="the sweep">
          {() => null}
        </QueryView>
      </Page>
    );
  }
  return <SweepSheet sweep={query.data} />;
}

function SweepSheet({ sweep }: { sweep: Sweep }) {
  const points = useApi('listSweepPoints', { params: { id: sweep.id } });
  const { now } = useNight();
  const names = useMemo(() => axisNames(sweep), [sweep]);
  const progress = sweepProgress(sweep);
  const tenths = Math.floor((10 * progress.done) / Math.max(1, progress.total));
  return (
    <Page
      wide
      title={sweep.title}
      lead={
        <>
          <StateMark state={sweepStateWord(sweep)} />
          <code>{sweep.model}</code>
          <span>
            asked <Clock at={sweep.createdAt} />
            {sweep.submission.mine ? '' : ` by ${sweep.submission.owner.label}`}
          </span>
        </>
      }
      actions={<SweepActions sweep={sweep} />}
    >
      <NightStrip />
      <SheetRow
        margin={
          <>
            <ProgressEntry sweep={sweep} now={now} />
            <CostEntry sweep={sweep} />
          </>
        }
      >
        <ProgressRuler progress={progress} unit="jobs" height={16} />
        {/* Said at every tenth, not at every job. */}
        <p role="status" className="sr-only">
          {tenths * 10} percent done
        </p>
        <section aria-labelledby="plot-heading" className="mt-6 min-h-100">
          <h2 id="plot-heading" className="sr-only">
            Plot
          </h2>
          <QueryView query={points} what="the points">
            {({ rows }) => (
              <Suspense fallback={<Loading what="the plot" />}>
                <SweepPlot sweep={sweep} points={rows} />
              </Suspense>
            )}
          </QueryView>
        </section>
      </SheetRow>
      <SheetRow divided margin={<AxesEntry sweep={sweep} names={names} />}>
        <h2>Points</h2>
        <div className="mt-2">
          <QueryView query={points} what="the points">
            {({ rows }) => (
              <>
                <PointMap sweep={sweep} points={rows} names={names} />
                <FailedPoints points={rows} names={names} />
                <PointsTable points={rows} names={names} />
              </>
            )}
          </QueryView>
        </div>
      </SheetRow>
    </Page>
  );
}
