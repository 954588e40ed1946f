import type { Night } from '@nightcone/contracts';
import { formatClock, formatUncertainty } from '../lib/format-time.ts';

const verbs = { done: 'ran', estimated: 'should run', waiting: 'should start' };

/** The night strip in words, for people who cannot see it. */
export function NightText({ night, now }: { night: Night; now: number }) {
  const clock = (at: string | Date) => formatClock(at, night.timeZone);
  return (
    <div className="sr-only">
      <p>
        The night from {clock(night.from)} to {clock(night.to)}; it is {clock(new Date(now))}. Jobs marked tonight may
        start between {clock(night.window.from)} and {clock(night.window.to)}. {night.slots.busy} of {night.slots.total}{' '}
        slots are busy.
        {night.myEnd
          ? ` Your last job should end at ${clock(night.myEnd.at)} ${formatUncertainty(night.myEnd.plusMinusS)}.`
          : ''}
      </p>
      <ul>
        {night.lanes.map((lane) => (
          <li key={lane.label}>
            {lane.name ?? lane.label}:{' '}
            {lane.bars.length === 0
              ? 'nothing'
              : lane.bars
                  .map(
                    (bar) =>
                      `${bar.title ? `${bar.title} ` : ''}${verbs[bar.state]} from ${clock(bar.from)} to ${clock(bar.to)} on ${Math.round(bar.slots * 10) / 10} slots`,
                  )
                  .join('; ')}
          </li>
        ))}
      </ul>
    </div>
  );
}
