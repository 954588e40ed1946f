import type { Quota } from '@nightcone/contracts';
import { useWidth } from '../../components/use-width.ts';
import { cpuParts, formatCpu } from '../../lib/format-time.ts';

const days = ['M', 'T', 'W', 'T', 'F', 'S', 'S'];
const dayMs = 86_400_000;
const height = 150;
const top = 14;
const base = 124;

/** The quota as a level against this week's line: use so far, what is reserved on top of it, and an even pace. */
export function QuotaLevel({ quota, now }: { quota: Quota; now: number }) {
  const [ref, width] = useWidth<HTMLDivElement>(308);
  const right = width - 92;
  const from = Date.parse(quota.weekStart);
  const to = Date.parse(quota.weekEnd);
  const most = Math.max(quota.grantedMs, quota.usedMs + quota.reservedMs, 1);
  const x = (at: number) => 1 + Math.min(1, Math.max(0, (at - from) / (to - from))) * (right - 1);
  const y = (ms: number) => base - (ms / most) * (base - top);
  const points = quota.line.map(({ at, usedMs }) => `${x(Date.parse(at))} ${y(usedMs)}`);
  const nowX = x(now);
  const used = y(quota.usedMs);
  const reserved = y(quota.usedMs + quota.reservedMs);
  const today = Math.min(6, Math.floor((now - from) / dayMs));
  // The two labels at the right keep their distance.
  const reservedLabel = Math.min(reserved + 4, used - 24);
  const grantedLabel = Math.min(y(quota.grantedMs) + 4, reservedLabel - 16);
  return (
    <div ref={ref}>
      <svg
        role="img"
        aria-label={`${formatCpu(quota.usedMs)} used and ${formatCpu(quota.reservedMs)} reserved of ${formatCpu(quota.grantedMs)} this week.`}
        width={width}
        height={height}
        className="block font-sans"
        fontSize={12}
      >
        <path d={`M1 ${y(quota.grantedMs)}H${right}`} stroke="var(--rule)" />
        <path d={`M1 ${base}L${right} ${y(quota.grantedMs)}`} stroke="var(--closed)" />
        <text x={14} y={y(quota.grantedMs * 0.82)} className="fill-ink3">
          even pace
        </text>
        {quota.reservedMs > 0 ? (
          <rect
            x={nowX}
            y={reserved}
            width={Math.max(0, right - nowX)}
            height={Math.max(1, used - reserved)}
            fill="var(--field)"
            stroke="var(--rule)"
          />
        ) : null}
        <path
          d={`M1 ${base}${points.map((point) => `L${point}`).join('')}L${nowX} ${used}`}
          fill="none"
          stroke="var(--ink)"
          strokeWidth={2}
          strokeLinejoin="round"
        />
        <circle cx={nowX} cy={used} r={3.5} fill="var(--ink)" />
        <path d={`M1 ${base + 0.5}H${right}`} stroke="var(--ink)" />
        {days.map((day, index) => {
          const dayX = 1 + ((index + 0.5) / 7) * (right - 1);
          const key = `${index}`;
          return (
            <g key={key}>
              <path d={`M${1 + (index / 7) * (right - 1)} ${base}v4`} stroke="var(--ink)" />
              <text
                x={dayX}
                y={base + 18}
                textAnchor="middle"
                className="fill-ink2"
                fontWeight={index === today ? 700 : 400}
              >
                {day}
              </text>
            </g>
          );
        })}
        <g className="num">
          <text x={right + 8} y={grantedLabel} className="fill-ink2">
            {formatCpu(quota.grantedMs)}
          </text>
          {quota.reservedMs > 0 ? (
            <text x={right + 8} y={reservedLabel} className="fill-ink">
              {inUnitOf(quota.usedMs + quota.reservedMs, quota.grantedMs)} with
              <tspan x={right + 8} dy={13}>
                reserved
              </tspan>
            </text>
          ) : null}
          <text x={right + 8} y={used + 4} className="fill-ink" fontWeight={700}>
            {inUnitOf(quota.usedMs, quota.grantedMs)} used
          </text>
        </g>
      </svg>
      <p className="text-ink2 text-small">
        <Cpu ms={quota.usedMs} /> used, <Cpu ms={quota.reservedMs} /> reserved, <Cpu ms={remaining(quota)} /> left; at
        most {quota.maxSlots} slots at once.
      </p>
    </div>
  );
}

/** A share of the grant in the grant's own unit, so that the labels of one drawing compare. */
function inUnitOf(ms: number, grantedMs: number): string {
  const { value } = cpuParts(ms, cpuParts(grantedMs).unit);
  return ms > 0 && Number(value) === 0 ? '< 0.1' : value;
}

const Cpu = ({ ms }: { ms: number }) => <span className="whitespace-nowrap">{formatCpu(ms)}</span>;

const remaining = (quota: Quota) => Math.max(0, quota.grantedMs - quota.usedMs - quota.reservedMs);
