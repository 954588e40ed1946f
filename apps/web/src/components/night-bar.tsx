import type { PlacedBar } from './night-layout.ts';

const words = { done: 'done', estimated: 'estimated', waiting: 'waiting' };
/** Average width of a letter at 12 px, to see whether a title fits into its bar. */
const letterWidth = 6.4;

/** Done: solid. Estimated: outlined with a light fill. Waiting: outlined, empty. One's own in ink, others' in grey. */
export function NightBarMark({
  placed,
  foot,
  mine,
  name,
}: {
  placed: PlacedBar;
  /** y of the lane's foot. */
  foot: number;
  mine: boolean;
  /** On hover; admins see names of others. */
  name: string;
}) {
  const { bar, x, width, offset, height } = placed;
  const y = foot - offset - height;
  const tone = mine ? 'var(--ink)' : 'var(--other)';
  const fill = bar.state === 'done' ? tone : bar.state === 'estimated' ? 'var(--otherlt)' : 'var(--ground)';
  const titleFits = bar.title && height >= 14 && width > bar.title.length * letterWidth + 14;
  return (
    <g>
      <title>{`${name}${bar.title ? `: ${bar.title}` : ''}, ${words[bar.state]}`}</title>
      <rect
        x={x + 0.5}
        y={y + 0.5}
        width={Math.max(1, width - 1)}
        height={Math.max(1, height - 1)}
        fill={fill}
        stroke={tone}
      />
      {titleFits ? (
        <text
          x={x + 7}
          y={y + height / 2 + 4}
          fontSize={12}
          fontWeight={bar.state === 'done' ? 600 : 400}
          fill={bar.state === 'done' ? 'var(--ground)' : 'var(--ink)'}
        >
          {bar.title}
        </text>
      ) : null}
    </g>
  );
}
