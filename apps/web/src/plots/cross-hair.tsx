import { formatNumber, type Geometry, round } from '@nightcone/drawing';

/** 1 px of ink through the place; both axes carry the value in an ink tag. `reach`: px beyond the right end. */
export function CrossHair({ geometry, x, y, reach }: { geometry: Geometry; x: number; y: number; reach: number }) {
  const { data } = geometry;
  const px = round(geometry.toX(x));
  const py = round(geometry.toY(y));
  const xText = formatNumber(x * geometry.x.factor, 4);
  const yText = formatNumber(y * geometry.y.factor, 5);
  const end = reach > 0 ? geometry.size.width + reach : data.x + data.width;
  return (
    <g className="pointer-events-none">
      <path d={`M${geometry.y.at},${py}H${end}M${px},${data.y}V${geometry.x.at}`} className="stroke-ink" fill="none" />
      <circle cx={px} cy={py} r={4.5} fill="var(--ground)" strokeWidth={2} className="stroke-ink" />
      <Tag x={Math.max(0, geometry.y.at - 12 - yText.length * 7.3)} y={py - 8} text={yText} />
      <Tag x={px - (xText.length * 7.3 + 12) / 2} y={geometry.x.at + 5} text={xText} />
    </g>
  );
}

function Tag({ x, y, text }: { x: number; y: number; text: string }) {
  return (
    <>
      <rect x={x} y={y} width={text.length * 7.3 + 12} height={17} className="fill-ink" />
      <text x={x + 6} y={y + 12.5} fontSize={12} className="fill-ground font-mono font-semibold">
        {text}
      </text>
    </>
  );
}
