import type { SweepPoint } from '@nightcone/contracts';
import { Link } from 'react-router-dom';
import { plural } from '../../lib/format-quantity.ts';
import { type AxisName, pointWords } from './point-values.ts';

const listed = 12;

interface Group {
  text: string;
  code: string;
  /** The machinery broke off: these can be put back. Otherwise the inputs are at fault. */
  brokenOff: boolean;
  points: SweepPoint[];
}

/** Failed points gathered by their reason, the most frequent first. */
export function groupFailures(points: readonly SweepPoint[]): Group[] {
  const groups = new Map<string, Group>();
  for (const point of points) {
    if (point.state !== 'failed' && point.state !== 'broken-off') continue;
    const text = point.failure?.text ?? 'No reason was recorded.';
    const code = point.failure?.code ?? point.state;
    const key = `${point.state} ${code} ${text}`;
    const group = groups.get(key) ?? { text, code, brokenOff: point.state === 'broken-off', points: [] };
    group.points.push(point);
    groups.set(key, group);
  }
  return [...groups.values()].sort((a, b) => b.points.length - a.points.length);
}

export function FailedPoints({ points, names }: { points: readonly SweepPoint[]; names: AxisName[] }) {
  const groups = groupFailures(points);
  if (groups.length === 0) return null;
  return (
    <section id="failed" aria-labelledby="failed-heading" className="mt-6">
      <h2 id="failed-heading">Failed points</h2>
      {groups.map((group) => (
        <div key={`${group.code} ${group.text}`} className="mt-2 border-ink border-l-2 pl-4">
          <p>
            <strong className="font-semibold">{plural(group.points.length, 'point')}.</strong> {group.text}
          </p>
          <p className="text-ink3 text-small">
            {group.brokenOff
              ? 'The machinery broke off, the inputs are not at fault: these points can be put back.'
              : 'The same inputs fail the same way, so they are not tried again.'}{' '}
            <code>{group.code}</code>
          </p>
          <ul className="mt-1 flex flex-wrap gap-x-5 text-small">
            {group.points.slice(0, listed).map((point) => (
              <li key={point.index}>
                <Link to={`/jobs/${point.jobHash}`} className="link inline-block min-h-6">
                  {pointWords(names, point.values)}
                </Link>
              </li>
            ))}
            {group.points.length > listed ? (
              <li className="text-ink3">and {group.points.length - listed} more</li>
            ) : null}
          </ul>
        </div>
      ))}
    </section>
  );
}
