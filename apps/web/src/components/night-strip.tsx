import type { Night } from '@nightcone/contracts';
import { formatClock, formatUncertainty } from '../lib/format-time.ts';
import { NightBarMark } from './night-bar.tsx';
import { nightScale, type PlacedBar, placeLane, slotHeight } from './night-layout.ts';
import { Hours, NowLine, TwilightBand } from './night-sky.tsx';
import { NightText } from './night-text.tsx';
import { Loading, ProblemNote } from './problem-note.tsx';
import { useNight } from './use-night.ts';
import { useWidth } from './use-width.ts';

/** The night strip in full: who runs what between dusk and dawn, from the scheduler's estimates. */
export function NightStrip() {
  const { night, now, query } = useNight();
  const [ref, width] = useWidth<HTMLDivElement>(1360);
  return (
    <section aria-label="The night" ref={ref} className="my-4 min-h-[150px]">
      {night ? (
        <>
          <Drawing night={night} now={now} width={width} />
          <NightText night={night} now={now} />
        </>
      ) : query.isError ? (
        <ProblemNote error={query.error} retry={() => void query.refetch()} />
      ) : (
        <Loading what="the scheduler’s plan" />
      )}
    </section>
  );
}

const bandY = 22;
const bandHeight = 6;

function Drawing({ night, now, width }: { night: Night; now: number; width: number }) {
  const narrow = width < 640;
  const labels = narrow ? 68 : 98;
  const scale = nightScale(night, labels, width - 1);
  const perSlot = slotHeight(night.slots.total);
  let y = bandY + bandHeight + 30;
  const lanes = night.lanes.map((lane) => {
    const placed = placeLane(lane, scale, perSlot);
    y += Math.max(17, placed.height) + 7;
    return { ...placed, foot: y };
  });
  const bottom = y + 7;
  const mine = lanes.find(({ lane }) => lane.mine);
  return (
    <svg
      aria-hidden="true"
      width={width}
      height={bottom + 34}
      viewBox={`0 0 ${width} ${bottom + 34}`}
      className="block overflow-visible font-sans"
    >
      {narrow ? null : (
        <text x={0} y={14} fontSize={12.5} className="fill-ink2">
          dusk to dawn
        </text>
      )}
      <Hours
        night={night}
        scale={scale}
        now={now}
        labelY={14}
        lineFrom={bandY + bandHeight}
        lineTo={bottom}
        leastGap={narrow ? 44 : 40}
        clear={narrow ? 42 : 62}
      />
      <TwilightBand night={night} scale={scale} y={bandY} height={bandHeight} />
      {lanes.map(({ lane, bars, foot }) => (
        <g key={lane.label}>
          <path d={`M${scale.left} ${foot + 0.5}H${scale.right}`} stroke="var(--hair)" />
          <text x={0} y={foot - 3} fontSize={12.5} fontWeight={lane.mine ? 700 : 400} className="fill-ink">
            {lane.label}
            {lane.name ? <title>{lane.name}</title> : null}
          </text>
          {bars.map((bar) => (
            <NightBarMark
              key={`${bar.bar.submissionId} ${bar.bar.state} ${bar.bar.from}`}
              placed={bar}
              foot={foot}
              mine={lane.mine}
              name={lane.name ?? lane.label}
            />
          ))}
        </g>
      ))}
      {mine && night.myEnd ? (
        <EndWhisker
          end={night.myEnd}
          timeZone={night.timeZone}
          scale={scale}
          top={mine.foot - lastTop(mine.bars, scale.x(night.myEnd.at))}
          narrow={narrow}
        />
      ) : null}
      <WindowBracket night={night} scale={scale} y={bottom + 7} narrow={narrow} />
      <NowLine night={night} scale={scale} now={now} labelY={14} from={bandY - 3} to={bottom} word={!narrow} />
    </svg>
  );
}

/** Height of the bar that ends at x, where the whisker stands. */
function lastTop(bars: readonly PlacedBar[], x: number): number {
  const nearest = bars.reduce<PlacedBar | undefined>((best, bar) => {
    const distance = (each: PlacedBar) => Math.abs(each.x + each.width - x);
    return best === undefined || distance(bar) < distance(best) ? bar : best;
  }, undefined);
  return nearest ? nearest.offset + nearest.height : 0;
}

/** As wide as the estimate is uncertain, above the bar of one's last job. */
function EndWhisker({
  end,
  timeZone,
  scale,
  top,
  narrow,
}: {
  end: NonNullable<Night['myEnd']>;
  timeZone: string;
  scale: ReturnType<typeof nightScale>;
  top: number;
  narrow: boolean;
}) {
  const at = Date.parse(end.at);
  const [from, middle, to] = [scale.x(at - end.plusMinusS * 1000), scale.x(at), scale.x(at + end.plusMinusS * 1000)];
  const y = top - 10;
  const rest = narrow ? '' : ` ${formatUncertainty(end.plusMinusS)}, your last job ends`;
  const right = to + 8 + (narrow ? 40 : 230) < scale.right;
  return (
    <g>
      <path
        d={`M${from} ${y - 4}V${y + 4}M${from} ${y}H${to}M${to} ${y - 4}V${y + 4}M${middle} ${y}V${top}`}
        stroke="var(--ink)"
        strokeWidth={1.4}
      />
      <text x={right ? to + 8 : from - 8} y={y + 4} fontSize={12.5} textAnchor={right ? 'start' : 'end'}>
        <tspan className="num fill-ink" fontWeight={700}>
          {formatClock(end.at, timeZone)}
        </tspan>
        <tspan className="fill-ink2">{rest}</tspan>
      </text>
    </g>
  );
}

function WindowBracket({
  night,
  scale,
  y,
  narrow,
}: {
  night: Night;
  scale: ReturnType<typeof nightScale>;
  y: number;
  narrow: boolean;
}) {
  const [from, to] = [scale.x(night.window.from), scale.x(night.window.to)];
  const clock = (at: string) => formatClock(at, night.timeZone);
  return (
    <g fontSize={12} className="fill-ink2">
      <path d={`M${from + 0.5} ${y - 6}V${y}H${to - 0.5}V${y - 6}`} fill="none" stroke="var(--rule)" />
      <text x={(from + to) / 2} y={y + 16} textAnchor="middle">
        {narrow
          ? `night window ${clock(night.window.from)} to ${clock(night.window.to)}`
          : `night window, ${clock(night.window.from)} to ${clock(night.window.to)}: jobs marked tonight may start`}
      </text>
      {width(scale) > 900 ? (
        <text x={scale.right} y={y + 16} textAnchor="end">
          bar height: slots held, so area is CPU time
        </text>
      ) : null}
    </g>
  );
}
const width = (scale: ReturnType<typeof nightScale>) => scale.right - scale.left;
