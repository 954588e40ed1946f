import type { Plot } from '@nightcone/drawing';
import type { ReactNode } from 'react';
import { PlotKey } from './plot-key.tsx';

/** Key and caption of a plot, and what can be done with it. */
export function PlotWords({
  plot,
  remark,
  actions,
  hidden = false,
}: {
  plot: Plot;
  remark?: ReactNode;
  actions?: ReactNode;
  /** For those only who cannot see the plot. */
  hidden?: boolean;
}) {
  if (hidden) return <figcaption className="sr-only">{plot.caption}</figcaption>;
  return (
    <div>
      {plot.key && plot.key.length > 1 ? <PlotKey entries={plot.key} /> : null}
      <div className="mt-1 flex flex-wrap gap-x-4 gap-y-1 text-ink2 text-small">
        <span>
          {plot.caption} {remark}
        </span>
        {actions}
      </div>
    </div>
  );
}
