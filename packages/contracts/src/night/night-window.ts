import { instantOf, minutesOf, wallClock } from './zoned-time.ts';

export interface NightSettings {
  timeZone: string;
  /** 'HH:MM' in the group's time zone; a night from 20:00 to 07:00 ends on the next day, equal times mean the whole day. */
  nightFrom: string;
  nightTo: string;
}
export interface Span {
  from: Date;
  to: Date;
}
export interface NightWindow extends Span {
  open: boolean;
}

/** The nights around an instant, in order: three before the day, one after. */
function nightsAround(now: Date, { timeZone, nightFrom, nightTo }: NightSettings): Span[] {
  const today = wallClock(now, timeZone);
  const [start, end] = [minutesOf(nightFrom), minutesOf(nightTo)];
  return [-3, -2, -1, 0, 1].map((shift) => ({
    from: instantOf({ ...today, day: today.day + shift, minutes: start }, timeZone),
    to: instantOf({ ...today, day: today.day + shift + (end <= start ? 1 : 0), minutes: end }, timeZone),
  }));
}

/** The night that is open now, or the next one. */
export function nightWindow(now: Date, settings: NightSettings): NightWindow {
  const night = nightsAround(now, settings).find(({ to }) => to > now) as Span;
  return { ...night, open: night.from <= now };
}

/** The latest night that is over. */
export function lastNight(now: Date, settings: NightSettings): Span {
  return nightsAround(now, settings).findLast(({ to }) => to <= now) as Span;
}

/** Monday 00:00 to the next, in the group's time zone: the quota's week. */
export function weekOf(now: Date, timeZone: string): Span {
  const today = wallClock(now, timeZone);
  const weekday = new Date(Date.UTC(today.year, today.month - 1, today.day)).getUTCDay();
  const monday = today.day - ((weekday + 6) % 7);
  return {
    from: instantOf({ ...today, day: monday, minutes: 0 }, timeZone),
    to: instantOf({ ...today, day: monday + 7, minutes: 0 }, timeZone),
  };
}
