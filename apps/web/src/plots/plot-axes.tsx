import { type Geometry, round } from '@nightcone/drawing';
import { memo } from 'react';
import { SymbolSpans } from './symbol-text.tsx';

/** Open frame: two spines 8 px off the data, ticks outward, symbol and unit above and at the right end. */
export const PlotAxes = memo(function PlotAxes({ geometry }: { geometry: Geometry }) {
  const { data, x, y, side, cells } = geometry;
  const ticks = [
    `M${data.x},${x.at}H${round(data.x + data.width)}`,
    ...x.ticks.map((tick) => `M${tick.at},${x.at}v${tick.label === null ? 3 : 5}`),
    `M${y.at},${data.y}V${round(data.y + data.height)}`,
    ...y.ticks.map((tick) => `M${y.at},${tick.at}h${tick.label === null ? -3 : -5}`),
  ].join('');
  return (
    <g>
      <path d={ticks} fill="none" className="stroke-rule" />
      <g className="fill-ink2 font-mono [font-feature-settings:'calt'_0]" fontSize={12}>
        {x.ticks.map((tick) =>
          tick.label === null ? null : (
            <text key={tick.at} x={tick.at} y={x.at + 18} textAnchor="middle">
              {tick.label}
            </text>
          ),
        )}
        {y.ticks.map((tick) =>
          tick.label === null ? null : (
            <text key={tick.at} x={y.at - 8} y={tick.at + 4} textAnchor="end">
              {tick.label}
            </text>
          ),
        )}
        {side?.labels.map((label) => (
          <text key={`${label.text} ${label.at}`} x={side.at} y={label.at + 4}>
            {label.text}
          </text>
        ))}
        {cells[0]?.bar.ticks.map((tick) => (
          <text key={tick.at} x={(cells[0]?.bar.x ?? 0) + 13} y={tick.at + 4}>
            {tick.label}
          </text>
        ))}
      </g>
      <g className="fill-ink font-serif" fontSize={16}>
        <text x={Math.max(4, y.at - 22)} y={data.y - 14}>
          <SymbolSpans runs={y.symbol} unit={y.unit} />
        </text>
        <text x={data.x + data.width} y={x.at + 36} textAnchor="end">
          <SymbolSpans runs={x.symbol} unit={x.unit} />
        </text>
        {side ? (
          <text x={side.at} y={data.y - 14} fontStyle="italic">
            {side.title}
          </text>
        ) : null}
        {cells[0] ? (
          <text x={geometry.size.width - 2} y={data.y - 14} textAnchor="end">
            <SymbolSpans runs={cells[0].bar.symbol} unit={cells[0].bar.unit} />
          </text>
        ) : null}
      </g>
    </g>
  );
});
