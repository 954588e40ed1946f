import { hashComb } from '@nightcone/provenance';
import { shortHash } from '../lib/format-hash.ts';
import { useCopy } from './copy-button.tsx';

const angles = [-60, 0, 60, 120, 180, 240].map((degrees) => (degrees * Math.PI) / 180);
/** Pointy-top hexagon, circumradius .93 of the pitch. */
const hexagon = (x: number, y: number) =>
  [30, 90, 150, 210, 270, 330]
    .map((degrees) => (degrees * Math.PI) / 180)
    .map((angle) => `${(x + 0.93 * Math.cos(angle)).toFixed(3)},${(y + 0.93 * Math.sin(angle)).toFixed(3)}`)
    .join(' ');
const centres: [number, number][] = [
  [0, 0],
  ...angles.map((angle): [number, number] => [Math.sqrt(3) * Math.cos(angle), Math.sqrt(3) * Math.sin(angle)]),
];
const outlines = centres.map(([x, y]) => hexagon(x, y));
const keelDistance = 2.9;

/** Seven hexagons drawn from a digest by a rule of our own; the same digest always gives the same comb. */
export function HashComb({ hash, radius = 25 }: { hash: string; radius?: number }) {
  const { tints, keel } = hashComb(hash);
  const angle = keel.kind === 'cell' ? (angles[keel.cell] ?? 0) : 0;
  const [x, y] = [keelDistance * Math.cos(angle), keelDistance * Math.sin(angle)];
  const [dx, dy] = [-0.55 * Math.sin(angle), 0.55 * Math.cos(angle)];
  return (
    <svg aria-hidden="true" viewBox="-3.2 -3.2 6.4 6.4" width={2 * radius} height={2 * radius} className="shrink-0">
      {outlines.map((points, cell) => (
        <polygon
          key={points}
          points={points}
          fill={`oklch(${tints[cell]}% 0.012 275)`}
          stroke="var(--rule)"
          strokeWidth={0.07}
        />
      ))}
      {keel.kind === 'ring' ? (
        <circle r={2.98} fill="none" stroke="currentColor" strokeWidth={0.14} />
      ) : keel.kind === 'cell' ? (
        <path d={`M${x - dx} ${y - dy}L${x + dx} ${y + dy}`} stroke="currentColor" strokeWidth={0.3} />
      ) : null}
    </svg>
  );
}

/** Comb and grouped short hash; a click copies all 64 digits. */
export function HashMark({ hash, what, radius = 16 }: { hash: string; what: string; radius?: number }) {
  const { copy, said } = useCopy(hash);
  return (
    <button
      type="button"
      onClick={copy}
      title={`Copy the ${what}: ${hash}`}
      aria-label={`${shortHash(hash)}, copy the whole ${what}`}
      className="group inline-flex min-h-6 cursor-pointer items-center gap-2.5"
    >
      <HashComb hash={hash} radius={radius} />
      <span aria-live="polite" className="num border-rule border-b group-hover:border-ink">
        {said ?? shortHash(hash)}
      </span>
    </button>
  );
}

/** In rows: the short hash alone, without a comb. */
export const ShortHash = ({ hash }: { hash: string }) => (
  <code title={hash} className="whitespace-nowrap">
    {shortHash(hash)}
  </code>
);
