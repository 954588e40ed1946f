import type { Night } from '@nightcone/contracts';
import { formatClock } from '../lib/format-time.ts';
import { nightScale } from './night-layout.ts';
import { Hours, NowLine, TwilightBand } from './night-sky.tsx';
import { NightText } from './night-text.tsx';
import { useNight } from './use-night.ts';
import { useWidth } from './use-width.ts';

/** Below this width the end of one's last job stands in the row of the hours. */
const narrow = 640;

/** The night strip under the header of the other pages: one's own bars, others as hairs, the end in words. */
export function NightStripThin() {
  const { night, now } = useNight();
  const [ref, width] = useWidth<HTMLDivElement>(1360);
  return (
    <section aria-label="The night" ref={ref} className="h-11 overflow-hidden">
      {night ? (
        <>
          <Drawing night={night} now={now} width={width} />
          <NightText night={night} now={now} />
        </>
      ) : null}
    </section>
  );
}

function Drawing({ night, now, width }: { night: Night; now: number; width: number }) {
  const scale = nightScale(night, 0, width);
  const mine = night.lanes.find((lane) => lane.mine);
  const others = night.lanes.filter((lane) => !lane.mine).slice(0, 6);
  const gap = Math.min(2.6, 13 / Math.max(1, others.length));
  return (
    <svg aria-hidden="true" width={width} height={44} viewBox={`0 0 ${width} 44`} className="block font-sans">
      <TwilightBand night={night} scale={scale} y={0} height={3} />
      <Hours
        night={night}
        scale={scale}
        now={now}
        labelY={41}
        lineFrom={3}
        lineTo={30}
        leastGap={scale.right < narrow ? 80 : 120}
        until={scale.right < narrow && night.myEnd ? scale.right - 110 : scale.right}
        clear={44}
      />
      {mine?.bars.map((bar) => {
        const x = scale.x(bar.from);
        return (
          <rect
            key={`${bar.submissionId} ${bar.state} ${bar.from}`}
            x={x + 0.5}
            y={8.5}
            width={Math.max(1, scale.x(bar.to) - x - 1)}
            height={6}
            fill={bar.state === 'done' ? 'var(--ink)' : bar.state === 'estimated' ? 'var(--otherlt)' : 'var(--ground)'}
            stroke="var(--ink)"
          />
        );
      })}
      {others.map((lane, index) =>
        lane.bars.map((bar) => (
          <path
            key={`${lane.label} ${bar.from} ${bar.state}`}
            d={`M${scale.x(bar.from)} ${18 + index * gap}H${scale.x(bar.to)}`}
            stroke={bar.state === 'done' ? 'var(--other)' : 'var(--rule)'}
            strokeOpacity={bar.state === 'done' ? 1 : 0.55}
            strokeWidth={1.4}
          />
        )),
      )}
      {night.myEnd ? <EndInWords night={night} end={night.myEnd.at} scale={scale} /> : null}
      <NowLine night={night} scale={scale} now={now} labelY={41} from={0} to={30} word={false} />
    </svg>
  );
}

function EndInWords({ night, end, scale }: { night: Night; end: string; scale: ReturnType<typeof nightScale> }) {
  const x = scale.x(end);
  const right = x + 190 < scale.right;
  if (scale.right < narrow) {
    return (
      <text x={scale.right} y={41} fontSize={12} textAnchor="end" className="fill-ink2">
        yours end{' '}
        <tspan className="num fill-ink" fontWeight={700}>
          {formatClock(end, night.timeZone)}
        </tspan>
      </text>
    );
  }
  return (
    <text x={right ? x + 8 : x - 8} y={16} fontSize={12} textAnchor={right ? 'start' : 'end'} className="fill-ink2">
      <tspan className="num fill-ink" fontWeight={700}>
        {formatClock(end, night.timeZone)}
      </tspan>{' '}
      your last job ends
    </text>
  );
}
