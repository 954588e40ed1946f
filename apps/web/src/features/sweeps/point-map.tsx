import type { Sweep, SweepPoint } from '@nightcone/contracts';
import { type PointerEvent, useMemo, useState } from 'react';
import { useNavigate } from 'react-router-dom';
import { stateWord } from '../../components/state-mark.tsx';
import { useWidth } from '../../components/use-width.ts';
import { formatCount, plural } from '../../lib/format-quantity.ts';
import { gridCells, gridShape, type Look } from './map-layout.ts';
import { type AxisName, pointWords } from './point-values.ts';

/** The grid of points: full = finished, light = result reused, amber = running, × = failed, outline = to come. */
export function PointMap({ sweep, points, names }: { sweep: Sweep; points: readonly SweepPoint[]; names: AxisName[] }) {
  const [ref, width] = useWidth<HTMLDivElement>(960);
  const navigate = useNavigate();
  const [at, setAt] = useState<number | null>(null);
  const [columns, rows] = gridShape(sweep.axes, points.length, width);
  const grid = useMemo(
    () =>
      gridCells(
        points.map((point) => point.state),
        columns,
        rows,
      ),
    [points, columns, rows],
  );
  const pitch = Math.max(2, Math.min(18, Math.floor(width / grid.columns)));
  const pointAt = (event: PointerEvent<SVGSVGElement>): number | null => {
    const box = event.currentTarget.getBoundingClientRect();
    const column = Math.floor((event.clientX - box.left) / pitch) * grid.binX;
    const row = Math.floor((event.clientY - box.top) / pitch) * grid.binY;
    const index = row * columns + column;
    return column < columns && index >= 0 && index < points.length ? index : null;
  };
  const here = at === null ? undefined : points[at];
  return (
    <div ref={ref}>
      {/* biome-ignore lint/a11y/useKeyWithClickEvents: the table of points below has a link for each */}
      <svg
        role="img"
        aria-label={mapWords(sweep)}
        width={grid.columns * pitch}
        height={grid.rows * pitch}
        className="block max-w-full cursor-pointer"
        onPointerMove={(event) => setAt(pointAt(event))}
        onPointerLeave={() => setAt(null)}
        onClick={() => here && void navigate(`/jobs/${here.jobHash}`)}
      >
        {looks.map((look) => (
          <path key={look} d={cellPath(grid.cells, look, grid.columns, pitch)} {...paint[look]} />
        ))}
      </svg>
      <p aria-hidden className="mt-1.5 min-h-[1.2rem] text-ink2 text-small">
        {here ? (
          <>
            {pointWords(names, here.values)}: {stateWord(here.state)}
          </>
        ) : grid.binX * grid.binY > 1 ? (
          `Each cell stands for ${formatCount(grid.binX * grid.binY)} points.`
        ) : (
          'Point at a cell for its values; a click opens its job.'
        )}
      </p>
    </div>
  );
}

const looks: Look[] = ['waiting', 'out', 'reused', 'done', 'running', 'failed'];
const paint: Record<Look, React.SVGProps<SVGPathElement>> = {
  done: { fill: 'var(--ink)' },
  reused: { fill: 'var(--otherlt)', stroke: 'var(--ink)' },
  running: { fill: 'var(--amberm)' },
  waiting: { fill: 'none', stroke: 'var(--rule)' },
  out: { fill: 'none', stroke: 'var(--rule)' },
  failed: { fill: 'none', stroke: 'var(--ink)', strokeWidth: 1.6 },
};

/** One path for all cells of a look. */
function cellPath(cells: readonly Look[], wanted: Look, columns: number, pitch: number): string {
  const gap = pitch > 6 ? 2 : pitch > 3 ? 1 : 0;
  const size = pitch - gap;
  const parts: string[] = [];
  cells.forEach((look, index) => {
    if (look !== wanted) return;
    const x = (index % columns) * pitch;
    const y = Math.floor(index / columns) * pitch;
    if (look === 'failed')
      parts.push(`M${x + 1} ${y + 1}l${size - 2} ${size - 2}m0 ${2 - size}l${2 - size} ${size - 2}`);
    else if (look === 'out') parts.push(`M${x + 1} ${y + size - 1}l${size - 2} ${2 - size}`);
    else if (look === 'waiting' || look === 'reused')
      parts.push(`M${x + 0.5} ${y + 0.5}h${size - 1}v${size - 1}h${1 - size}z`);
    else parts.push(`M${x} ${y}h${size}v${size}h${-size}z`);
  });
  return parts.join('');
}

function mapWords(sweep: Sweep): string {
  const counts = Object.entries(sweep.counts)
    .filter(([, count]) => count > 0)
    .map(([state, count]) => `${formatCount(count)} ${stateWord(state)}`);
  return `Map of ${plural(sweep.points, 'point')}: ${counts.join(', ')}.`;
}
