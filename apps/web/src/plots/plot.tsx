import { layoutPlot } from '@nightcone/drawing';
import { type KeyboardEvent, type ReactNode, useEffect, useId, useMemo, useRef, useState } from 'react';
import { useWidth } from '../components/use-width.ts';
import type { BuiltPlot, Readout } from './built-plot.ts';
import { CrossHair } from './cross-hair.tsx';
import { type Direction, nearestTarget, nextTarget } from './nearest-target.ts';
import { PlotAxes } from './plot-axes.tsx';
import { PlotCanvas } from './plot-canvas.tsx';

import { PlotMarks, PlotRules } from './plot-marks.tsx';
import { PlotWords } from './plot-words.tsx';
import { usePlotPointer } from './use-plot-pointer.ts';
import { usePlotWindow } from './use-plot-window.ts';

/** From here on marks are painted on a canvas. */
const canvasFrom = 5000;
const keys: Record<string, Direction> = { ArrowLeft: 'left', ArrowRight: 'right', ArrowUp: 'up', ArrowDown: 'down' };

export interface PlotProps {
  built: BuiltPlot;
  /** Height in px; the width is that of its place. */
  height?: number;
  /** The read-out goes there and not under the plot. null when the cross-hair leaves. */
  onReadout?: (readout: Readout | null) => void;
  /** px that the cross-hair's horizontal line runs on to the right, to the read-out in the margin. */
  reach?: number;
  /** Stands in the caption line: what this plot is not (a preview). */
  remark?: ReactNode;
  /** Buttons at the end of the caption line (table, exports). */
  actions?: ReactNode;
  /** A click on a place, e.g. opens the job behind a point of a sweep. */
  onPick?: (index: number) => void;
  compact?: boolean;
  /** False: key and caption stand elsewhere on the page. */
  words?: boolean;
}

/** A plot with axes, marks, cross-hair, zoom, key and caption. */
export function PlotView(props: PlotProps) {
  const { built, height = 420, onReadout, reach = 0, remark, actions, onPick, compact = false, words = true } = props;
  const { plot, targets } = built;
  const [box, width] = useWidth<HTMLDivElement>(640);
  const surface = useRef<HTMLDivElement | null>(null);
  const view = usePlotWindow(plot);
  const geometry = useMemo(
    () => layoutPlot(plot, { width, height }, view.domains),
    [plot, width, height, view.domains],
  );
  const [active, setActive] = useState<number | null>(null);
  const hover = (place: { x: number; y: number } | null) =>
    setActive(place && nearestTarget(targets, geometry, place.x, place.y, 60));
  const many = useMemo(() => countMarks(built) > canvasFrom, [built]);
  const { brush, shift, handlers } = usePlotPointer(surface, geometry, view, hover, many);
  const at = active !== null && active < targets.x.length ? active : null;
  const readout = useMemo(
    () => (at === null ? null : { ...targets.describe(at), top: geometry.toY(targets.y[at] as number) }),
    [at, targets, geometry],
  );
  useEffect(() => onReadout?.(readout), [readout, onReadout]);
  const help = useId();

  const onKeyDown = (event: KeyboardEvent) => {
    const { data } = geometry;
    const middle = { x: data.x + data.width / 2, y: data.y + data.height / 2 };
    const direction = keys[event.key];
    if (direction && event.shiftKey) {
      const [dx, dy] = { left: [-40, 0], right: [40, 0], up: [0, -40], down: [0, 40] }[direction] as [number, number];
      view.panBy(geometry, dx, dy);
    } else if (direction) {
      setActive(
        at === null
          ? nearestTarget(targets, geometry, middle.x, middle.y)
          : nextTarget(targets, geometry, at, direction),
      );
    } else if (event.key === '+' || event.key === '=') view.zoomAt(geometry, middle.x, middle.y, 0.8);
    else if (event.key === '-') view.zoomAt(geometry, middle.x, middle.y, 1.25);
    else if (event.key === '0') view.reset();
    else if (event.key === 'Escape') setActive(null);
    else if (event.key === 'Enter' && at !== null && onPick) onPick(at);
    else return;
    event.preventDefault();
  };

  return (
    <figure className="min-w-0" data-plot="">
      <div ref={box} className="relative">
        <div
          ref={surface}
          role="application"
          aria-roledescription="plot"
          aria-label={plot.caption}
          aria-describedby={help}
          // biome-ignore lint/a11y/noNoninteractiveTabindex: the cross-hair is moved by keys
          tabIndex={0}
          className={`relative touch-pan-y select-none ${onPick ? 'cursor-pointer' : 'cursor-crosshair'}`}
          style={{ height }}
          onKeyDown={onKeyDown}
          onClick={() => at !== null && !brush && onPick?.(at)}
          {...handlers}
        >
          {many || geometry.cells.length > 0 ? <PlotCanvas geometry={geometry} marks={many} shift={shift} /> : null}
          <svg width={width} height={height} className="absolute inset-0 overflow-visible" aria-hidden="true">
            {many ? <PlotRules geometry={geometry} /> : <PlotMarks geometry={geometry} />}
            <PlotAxes geometry={geometry} />
            {brush ? <rect {...brush} className="fill-ink/10 stroke-ink" strokeDasharray="3 3" /> : null}
            {at !== null && !brush ? (
              <CrossHair
                geometry={geometry}
                x={targets.x[at] as number}
                y={targets.y[at] as number}
                reach={onReadout ? reach : 0}
              />
            ) : null}
          </svg>
        </div>
        <p id={help} className="sr-only">
          Arrow keys move the cross-hair, plus and minus zoom, Shift with arrows moves the window, 0 shows all. The
          values are in the table under the plot.
        </p>
        <p className="sr-only" aria-live="polite">
          {readout ? `${readout.value}, ${readout.description}` : ''}
        </p>
        {view.zoomed ? (
          <button
            type="button"
            onClick={view.reset}
            className="absolute top-0 right-0 min-h-6 cursor-pointer bg-ground px-1 text-small underline underline-offset-2"
          >
            Show all
          </button>
        ) : null}
      </div>
      {onReadout || compact ? null : <ReadoutLine readout={readout} />}
      {words ? (
        <PlotWords plot={plot} remark={remark} actions={actions} hidden={compact} />
      ) : (
        <figcaption className="sr-only">{plot.caption}</figcaption>
      )}
    </figure>
  );
}

/** The read-out under a plot; its line keeps its height, so that nothing jumps. */
function ReadoutLine({ readout }: { readout: Readout | null }) {
  return (
    <p className="min-h-6 overflow-hidden text-ellipsis whitespace-nowrap text-small" aria-hidden="true">
      {readout ? (
        <>
          <b className="num">{readout.value}</b>
          <span className="text-ink2">
            {' '}
            {readout.description}
            {readout.rows.map((row) => `; ${row.label} ${row.value}`).join('')}
          </span>
        </>
      ) : null}
    </p>
  );
}

function countMarks({ plot }: BuiltPlot): number {
  return plot.marks.reduce(
    (sum, mark) => (mark.kind === 'line' || mark.kind === 'points' ? sum + mark.x.length : sum),
    0,
  );
}
