/** CPU durations and clock times. Every clock time is in the group's zone, 24 hours. */

/** 420 CPU-ms, 5.8 CPU-s, 14.1 CPU-min, 6.2 CPU-h. */
export function formatCpu(ms: number): string {
  const { value, unit } = cpuParts(ms);
  return `${value} ${unit}`;
}

const cpuUnits: [unit: string, ms: number, below: number][] = [
  ['CPU-ms', 1, 1000],
  ['CPU-s', 1000, 60_000],
  ['CPU-min', 60_000, 6_000_000],
  ['CPU-h', 3_600_000, Number.POSITIVE_INFINITY],
];

/** Number and unit apart; in a given unit where several stand together. */
export function cpuParts(ms: number, inUnit?: string): { value: string; unit: string } {
  const size = Math.abs(ms);
  const fitting = ms === 0 ? cpuUnits[1] : cpuUnits.find(([, , below]) => size < below);
  const [unit, divisor] = cpuUnits.find(([name]) => name === inUnit) ?? fitting ?? ['CPU-ms', 1];
  const value = ms / divisor;
  const text = Math.abs(value) >= 100 || divisor === 1 ? value.toFixed(0) : value.toFixed(1).replace(/\.0$/, '');
  return { value: text.replace(/^-/, '−'), unit };
}

const formatters = new Map<string, Intl.DateTimeFormat>();
function formatter(timeZone: string, options: Intl.DateTimeFormatOptions): Intl.DateTimeFormat {
  const key = `${timeZone} ${JSON.stringify(options)}`;
  let made = formatters.get(key);
  if (!made) {
    made = new Intl.DateTimeFormat('en-GB', { ...options, timeZone, hourCycle: 'h23' });
    formatters.set(key, made);
  }
  return made;
}

/** 23:42 */
export const formatClock = (at: string | Date, timeZone: string): string =>
  formatter(timeZone, { hour: '2-digit', minute: '2-digit' }).format(new Date(at));

/** 2026-02-12 */
export function formatDate(at: string | Date, timeZone: string): string {
  const parts = formatter(timeZone, { year: 'numeric', month: '2-digit', day: '2-digit' }).formatToParts(new Date(at));
  const part = (type: string) => parts.find((each) => each.type === type)?.value ?? '';
  return `${part('year')}-${part('month')}-${part('day')}`;
}

/** The clock alone within 20 hours of now, with the day of the week within 6 days, with its date otherwise. */
export function formatMoment(at: string | Date, timeZone: string, now: Date = new Date()): string {
  const date = new Date(at);
  const hours = Math.abs(date.getTime() - now.getTime()) / 3_600_000;
  const clock = formatClock(date, timeZone);
  if (hours < 20) return clock;
  return `${hours < 144 ? formatter(timeZone, { weekday: 'short' }).format(date) : formatDate(date, timeZone)} ${clock}`;
}

/** ISO date and time with seconds and the zone, for the tooltip. */
export function formatExact(at: string | Date, timeZone: string): string {
  const date = new Date(at);
  const time = formatter(timeZone, { hour: '2-digit', minute: '2-digit', second: '2-digit' }).format(date);
  return `${formatDate(date, timeZone)} ${time} ${timeZone}`;
}

/** ± 12 min, ± 40 s, ± 2 h */
export function formatUncertainty(seconds: number): string {
  if (seconds < 60) return `± ${Math.max(1, Math.ceil(seconds))} s`;
  if (seconds < 5400) return `± ${Math.ceil(seconds / 60)} min`;
  return `± ${Math.ceil(seconds / 3600)} h`;
}
