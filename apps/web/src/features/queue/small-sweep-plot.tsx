import { lazy, Suspense } from 'react';
import { useApi } from '../../lib/query.ts';

const SweepPlot = lazy(async () => ({ default: (await import('../../plots/sweep-plot.tsx')).SweepPlot }));

/** A sweep at a glance. Its place is kept while the plots load, after the page itself. */
export function SmallSweepPlot({ sweepId }: { sweepId: string }) {
  const sweep = useApi('getSweep', { params: { id: sweepId } });
  const points = useApi('listSweepPoints', { params: { id: sweepId } });
  return (
    <div className="min-h-48">
      {sweep.data && points.data ? (
        <Suspense>
          <SweepPlot sweep={sweep.data} points={points.data.rows} compact />
        </Suspense>
      ) : null}
    </div>
  );
}
