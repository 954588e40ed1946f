import type { Expected } from '@nightcone/contracts';
import { formatClock, formatExact, formatMoment, formatUncertainty } from '../lib/format-time.ts';
import { useTimeZone } from '../lib/session.ts';

/** A clock time in the group's zone; date, seconds and zone on hover. */
export function Clock({ at, withDate = true }: { at: string; withDate?: boolean }) {
  const zone = useTimeZone();
  return (
    <time dateTime={at} title={formatExact(at, zone)} className="num whitespace-nowrap">
      {withDate ? formatMoment(at, zone) : formatClock(at, zone)}
    </time>
  );
}

/** `03:18 ± 12 min`: estimates of time carry errors as energies do. */
export function ExpectedClock({ expected }: { expected: Expected }) {
  return (
    <span className="num whitespace-nowrap">
      <Clock at={expected.at} /> <span className="text-ink3">{formatUncertainty(expected.plusMinusS)}</span>
    </span>
  );
}
