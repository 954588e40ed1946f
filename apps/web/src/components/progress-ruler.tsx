import type { Submission } from '@nightcone/contracts';
import { formatCount } from '../lib/format-quantity.ts';
import { useWidth } from './use-width.ts';

type Progress = Submission['progress'];
export type Cell = 'done' | 'failed' | 'running' | 'waiting';

/** Narrowest cell with its gap that still reads as a cell. */
const leastPitch = 4;

/** One cell per job or slice; where there are more than fit, each cell stands for an equal share, rounded down. */
export function rulerCells({ done, failed, running, total }: Progress, most: number): Cell[] {
  const cells = Math.max(1, Math.min(total, most));
  const share = (count: number) => (total <= most ? count : Math.floor((count * cells) / total));
  const doneCells = share(done);
  const failedCells = failed > 0 ? Math.max(1, share(failed)) : 0;
  const runningCells = running > 0 ? Math.max(1, share(running)) : 0;
  return Array.from({ length: cells }, (_, index) =>
    index < doneCells
      ? 'done'
      : index < doneCells + failedCells
        ? 'failed'
        : index < doneCells + failedCells + runningCells
          ? 'running'
          : 'waiting',
  );
}

/** Full = done, amber = running, low outline = to come, × = failed. */
export function ProgressRuler({
  progress,
  unit,
  mine = true,
  height = 14,
}: {
  progress: Progress;
  unit: 'jobs' | 'slices';
  mine?: boolean;
  height?: number;
}) {
  const [ref, width] = useWidth<HTMLDivElement>(250);
  const cells = rulerCells(progress, Math.floor(width / leastPitch));
  const pitch = Math.min(20, width / cells.length);
  const gap = pitch > 6 ? 1.6 : 1;
  const full = mine ? 'var(--ink)' : 'var(--other)';
  return (
    <div ref={ref} className="w-full min-w-0">
      <svg role="img" aria-label={progressWords(progress, unit)} width={width} height={height} className="block">
        {cells.map((cell, index) => {
          const x = index * pitch;
          const w = Math.max(1.5, pitch - gap);
          // Cells are places on a ruler: the index is what they are.
          const key = `${index}`;
          if (cell === 'waiting') {
            return (
              <rect
                key={key}
                x={x + 0.5}
                y={height - 4.5}
                width={Math.max(1, w - 1)}
                height={4}
                fill="none"
                stroke="var(--rule)"
              />
            );
          }
          if (cell === 'failed') {
            const s = Math.min(w, height) / 2;
            const [cx, cy] = [x + w / 2, height / 2];
            return (
              <path
                key={key}
                d={`M${cx - s} ${cy - s}l${2 * s} ${2 * s}m0 ${-2 * s}l${-2 * s} ${2 * s}`}
                stroke="var(--ink)"
                strokeWidth={1.4}
              />
            );
          }
          return (
            <rect key={key} x={x} y={0} width={w} height={height} fill={cell === 'done' ? full : 'var(--amberm)'} />
          );
        })}
      </svg>
    </div>
  );
}

/** `14 of 25 jobs done, 4 running` */
export function progressWords({ done, failed, running, total }: Progress, unit: string): string {
  const parts = [`${formatCount(done)} of ${formatCount(total)} ${unit} done`];
  if (running > 0) parts.push(`${formatCount(running)} running`);
  if (failed > 0) parts.push(`${formatCount(failed)} failed`);
  return parts.join(', ');
}
