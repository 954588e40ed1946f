/** Wall-clock arithmetic in a time zone, on nothing but Intl. Instants are Dates, wall clocks are minutes of a day. */

export interface WallClock {
  year: number;
  /** 1…12 */
  month: number;
  day: number;
  /** Minutes since midnight, as the wall shows them. */
  minutes: number;
}

const formats = new Map<string, Intl.DateTimeFormat>();
function formatOf(timeZone: string): Intl.DateTimeFormat {
  let format = formats.get(timeZone);
  if (!format) {
    format = new Intl.DateTimeFormat('en-GB', {
      timeZone,
      hourCycle: 'h23',
      year: 'numeric',
      month: 'numeric',
      day: 'numeric',
      hour: 'numeric',
      minute: 'numeric',
      second: 'numeric',
    });
    formats.set(timeZone, format);
  }
  return format;
}

/** Milliseconds by which the wall clock of the zone is ahead of UTC at an instant. */
export function offsetMs(at: number, timeZone: string): number {
  const part: Record<string, number> = {};
  for (const { type, value } of formatOf(timeZone).formatToParts(at)) part[type] = Number(value);
  const { year = 0, month = 1, day = 1, hour = 0, minute = 0, second = 0 } = part;
  const wholeSecond = Math.floor(at / 1000) * 1000;
  return Date.UTC(year, month - 1, day, hour, minute, second) - wholeSecond;
}

export function wallClock(at: Date, timeZone: string): WallClock {
  const local = new Date(at.getTime() + offsetMs(at.getTime(), timeZone));
  return {
    year: local.getUTCFullYear(),
    month: local.getUTCMonth() + 1,
    day: local.getUTCDate(),
    minutes: local.getUTCHours() * 60 + local.getUTCMinutes(),
  };
}

const dayMs = 86_400_000;

/**
 * The instant at which the wall shows this. `day` may run over the month's end. A time that the spring change leaves out
 * is read with the offset before it, one that the autumn change shows twice is the second: PostgreSQL's rule, which the
 * queue obeys.
 */
export function instantOf({ year, month, day, minutes }: WallClock, timeZone: string): Date {
  const wall = Date.UTC(year, month - 1, day, 0, minutes);
  const before = offsetMs(wall - dayMs, timeZone);
  const after = offsetMs(wall + dayMs, timeZone);
  const withAfter = wall - after;
  if (offsetMs(withAfter, timeZone) === after) return new Date(withAfter);
  return new Date(wall - before);
}

/** 'HH:MM' (or 'HH:MM:SS') as minutes since midnight. */
export function minutesOf(clock: string): number {
  const match = /^(\d\d):(\d\d)/.exec(clock);
  if (!match) throw new RangeError(`“${clock}” is no time of day`);
  return Number(match[1]) * 60 + Number(match[2]);
}
