import type { Night } from '@nightcone/contracts';
import { formatClock } from '../lib/format-time.ts';
import { hourMarks, type NightScale, twilight } from './night-layout.ts';

/** The twilight band over the strip. */
export function TwilightBand({
  night,
  scale,
  y,
  height,
}: {
  night: Night;
  scale: NightScale;
  y: number;
  height: number;
}) {
  return twilight(night).map(({ from, to, step }) => (
    <rect
      key={from}
      x={scale.x(from)}
      y={y}
      width={scale.x(to) - scale.x(from)}
      height={height}
      fill={`var(--twilight-${step})`}
    />
  ));
}

/** Hours in words and as hairlines; the label that the mark for now would cover is left out. */
export function Hours({
  night,
  scale,
  now,
  labelY,
  lineFrom,
  lineTo,
  leastGap,
  clear,
  until = scale.right,
}: {
  night: Night;
  scale: NightScale;
  now: number;
  labelY: number;
  lineFrom: number;
  lineTo: number;
  leastGap: number;
  /** Half the width of the label for now. */
  clear: number;
  /** No labels to the right of this. */
  until?: number;
}) {
  const nowX = scale.x(now);
  return hourMarks(night, scale.right - scale.left, leastGap).map((mark) => {
    const x = scale.x(mark.at);
    const long = Number(mark.label) % 3 === 0;
    return (
      <g key={mark.at}>
        <path d={`M${x} ${lineFrom}V${long ? lineTo : lineFrom + 4}`} stroke="var(--hair)" />
        {mark.labelled && x <= until && Math.abs(x - nowX) > clear ? (
          <text
            x={x}
            y={labelY}
            textAnchor={x > scale.right - 9 ? 'end' : x < scale.left + 9 ? 'start' : 'middle'}
            className="num fill-ink2"
            fontSize={12}
          >
            {mark.label}
          </text>
        ) : null}
      </g>
    );
  });
}

/** The amber line with the time. Nothing while now lies outside the night. */
export function NowLine({
  night,
  scale,
  now,
  labelY,
  from,
  to,
  word,
}: {
  night: Night;
  scale: NightScale;
  now: number;
  labelY: number;
  from: number;
  to: number;
  word: boolean;
}) {
  if (now < Date.parse(night.from) || now > Date.parse(night.to)) return null;
  const x = scale.x(now);
  const half = word ? 36 : 20;
  const labelX = Math.min(scale.right - half, Math.max(scale.left + half, x));
  return (
    <g>
      <path d={`M${x} ${from}V${to}`} stroke="var(--amberm)" strokeWidth={2} />
      <text x={labelX} y={labelY} textAnchor="middle" className="num fill-ambert" fontSize={12} fontWeight={700}>
        {word ? 'now ' : ''}
        {formatClock(new Date(now), night.timeZone)}
      </text>
    </g>
  );
}
