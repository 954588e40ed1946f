import { type Geometry, labelShift, markPath, type PointsGeometry } from '@nightcone/drawing';
import { memo, useId } from 'react';
import { numbered } from './numbered.ts';
import { roleColor } from './role-colors.ts';

/** Lines, points and rules as SVG; used up to 5 000 marks. */
export const PlotMarks = memo(function PlotMarks({ geometry }: { geometry: Geometry }) {
  const clip = useId();
  const { data } = geometry;
  return (
    <g>
      <clipPath id={clip}>
        <rect x={data.x} y={data.y - 1} width={data.width} height={data.height + 2} />
      </clipPath>
      <PlotRules geometry={geometry} />
      <g clipPath={`url(#${clip})`} fill="none" strokeLinejoin="round">
        {numbered(geometry.lines).map(({ key, item: line }) => (
          <path
            key={key}
            d={line.path}
            stroke={roleColor(line.role)}
            strokeWidth={line.width}
            strokeDasharray={line.dash ?? undefined}
          />
        ))}
      </g>
      {numbered(geometry.points).map(({ key, item: points }) => (
        <Points key={key} points={points} />
      ))}
    </g>
  );
});

/** Closed-form levels under the lines, markers with their words above the data. */
export function PlotRules({ geometry }: { geometry: Geometry }) {
  return (
    <>
      {numbered(geometry.rules).map(({ key, item: rule }) => (
        <g key={key}>
          <path
            d={`M${rule.from[0]},${rule.from[1]}L${rule.to[0]},${rule.to[1]}`}
            stroke={roleColor(rule.role)}
            strokeDasharray={rule.dotted ? '1 4' : undefined}
          />
          {rule.label ? (
            <text
              x={rule.from[0] + labelShift[rule.anchor]}
              y={rule.from[1] + (rule.anchor === 'middle' ? -5 : 6)}
              textAnchor={rule.anchor}
              fontSize={rule.anchor === 'middle' ? 15 : 12}
              className="fill-ink2"
            >
              {rule.label}
            </text>
          ) : null}
        </g>
      ))}
    </>
  );
}

function Points({ points }: { points: PointsGeometry }) {
  const shape = markPath(points.shape, points.radius);
  const color = roleColor(points.role);
  const style =
    points.shape === 'dot'
      ? { fill: color }
      : { fill: points.shape === 'open' ? 'var(--ground)' : 'none', stroke: color, strokeWidth: 1.3 };
  return (
    <g {...style}>
      {Array.from({ length: points.places.length / 2 }, (_, i) => (
        <path
          // biome-ignore lint/suspicious/noArrayIndexKey: a place in a list of places has no other name
          key={i}
          d={shape}
          transform={`translate(${points.places[2 * i]} ${points.places[2 * i + 1]})`}
        />
      ))}
    </g>
  );
}
