import type { JobView } from '@nightcone/contracts';
import { useMemo, useState } from 'react';
import { Loading, Note, ProblemNote } from '../components/problem-note.tsx';
import { shortHash } from '../lib/format-hash.ts';
import type { Readout } from './built-plot.ts';
import { PlotView } from './plot.tsx';
import { PlotActions } from './plot-actions.tsx';
import type { Body, ResultData } from './result-data.ts';
import { Segmented } from './segmented.tsx';
import { useResultData } from './use-result-data.ts';
import type { View } from './view.ts';
import { ViewChoice } from './view-choice.tsx';
import { viewsOf } from './views.ts';

type PlottedJob = Pick<JobView, 'hash' | 'model' | 'title' | 'kernel' | 'resultDigest' | 'arrays' | 'specification'>;

/**
 * The plots of one job's result. `onReadout` takes the numbers under the cross-hair (the job page shows them in its
 * margin); without it they stand under the plot. `reach`: px to the right that the cross-hair's line runs on.
 */
export function ResultPlot({
  job,
  onReadout,
  reach,
  height = 460,
}: {
  job: PlottedJob;
  onReadout?: (readout: Readout | null) => void;
  reach?: number;
  height?: number;
}) {
  const views = useMemo(() => viewsOf(job.model, job.arrays), [job.model, job.arrays]);
  const [chosen, setChosen] = useState<string | null>(null);
  const view = views.find(({ id }) => id === chosen) ?? views[0];
  const { data, problem, retry } = useResultData(
    job.resultDigest,
    job.specification as unknown as Body,
    job.arrays,
    view,
  );
  if (!view)
    return (
      <Note title="Nothing to draw yet">
        <p>The plot appears here when the result is there.</p>
      </Note>
    );
  return (
    <div>
      {views.length > 1 ? (
        <div className="mb-2 max-w-md">
          <Segmented
            label="What is drawn"
            labelHidden
            options={views.map(({ id, label }) => ({ value: id, label }))}
            value={view.id}
            onChange={setChosen}
          />
        </div>
      ) : null}
      {problem ? (
        <ProblemNote error={problem} retry={retry} />
      ) : data ? (
        <Drawn key={view.id} job={job} view={view} data={data} height={height} onReadout={onReadout} reach={reach} />
      ) : (
        <div style={{ minHeight: height + 60 }}>
          <Loading what="the result" />
        </div>
      )}
    </div>
  );
}

function Drawn({
  job,
  view,
  data,
  height,
  onReadout,
  reach,
}: {
  job: PlottedJob;
  view: View;
  data: ResultData;
  height: number;
  onReadout: ((readout: Readout | null) => void) | undefined;
  reach: number | undefined;
}) {
  const [choice, setChoice] = useState(0);
  const built = useMemo(() => view.build(data, choice), [view, data, choice]);
  return (
    <>
      <ViewChoice view={view} data={data} choice={choice} onChoice={setChoice} />
      <PlotView
        built={built}
        height={height}
        {...(onReadout ? { onReadout } : {})}
        {...(reach ? { reach } : {})}
        actions={
          <PlotActions
            built={built}
            name={`${job.model}-${view.id}-${job.hash.slice(0, 12)}`}
            metadata={{
              job: job.hash,
              kernel: job.kernel,
              ...(job.resultDigest ? { result: job.resultDigest } : {}),
              program: `Nightcone, job ${shortHash(job.hash)}`,
            }}
          />
        }
      />
    </>
  );
}
