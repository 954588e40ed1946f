import type { NightWindow } from '../night/night-window.ts';
import { shareSlots } from './share-slots.ts';

/** What is left of one submission. Times are CPU milliseconds on one slot. */
export interface OpenWork {
  submissionId: string;
  accountId: string;
  when: 'now' | 'tonight';
  paused: boolean;
  /** Higher first, among one's own work only; then the older one. */
  priority: number;
  createdAt: Date;
  remainingMs: number;
  /** Length of one part: work of n parts fills at most n slots. */
  partMs: number;
  /** Share of the whole that is done, 0…1: what is done teaches how long the rest takes. */
  done: number;
}

export interface ForecastSettings {
  now: Date;
  slots: number;
  /** Weight and cap of each person. */
  people: ReadonlyMap<string, { weight: number; maxSlots: number }>;
  nightAt: (at: Date) => NightWindow;
  /** Nothing is drawn or promised beyond. */
  horizon: Date;
}

export interface ForecastBar {
  submissionId: string;
  accountId: string;
  from: Date;
  to: Date;
  /** Mean number of slots held, so that area is CPU time. */
  slots: number;
}
export interface Forecast {
  bars: ForecastBar[];
  /** By submission; absent when it does not end before the horizon. */
  ends: Map<string, { at: Date; plusMinusS: number }>;
}

/**
 * Relative error of an estimate of remaining time: 30 % before anything has run, shrinking to 5 % with what is done.
 * Both ends are chosen, not measured: formulas of cost are calibrated to about a quarter, parts of one sweep are alike.
 */
const relativeError = (done: number) => 0.3 - 0.25 * Math.min(1, Math.max(0, done));

interface Running {
  work: OpenWork;
  left: number;
  slots: number;
}

/**
 * Who will run what, when: the remaining work is let flow through the slots under fair share, caps and the night
 * window, event by event. Inside the window work for the night comes first; outside it does not run.
 */
export function forecast(open: readonly OpenWork[], settings: ForecastSettings): Forecast {
  const bars: ForecastBar[] = [];
  const ends: Forecast['ends'] = new Map();
  const firstRun = new Map<string, number>();
  let left: Running[] = open
    .filter(({ paused, remainingMs }) => !paused && remainingMs > 0)
    .toSorted((a, b) => b.priority - a.priority || a.createdAt.getTime() - b.createdAt.getTime())
    .map((work) => ({ work, left: work.remainingMs, slots: 0 }));
  let at = settings.now.getTime();
  const horizon = settings.horizon.getTime();

  while (left.length > 0 && at < horizon) {
    const night = settings.nightAt(new Date(at));
    assignSlots(left, night.open, settings);
    const change = night.open ? night.to.getTime() : night.from.getTime();
    const busy = left.filter(({ slots }) => slots > 0);
    const firstEnd = busy.reduce((least, run) => Math.min(least, at + run.left / run.slots), Number.POSITIVE_INFINITY);
    const next = Math.min(change, firstEnd, horizon);
    for (const run of busy) {
      if (!firstRun.has(run.work.submissionId)) firstRun.set(run.work.submissionId, at);
      addBar(bars, run, at, next);
      run.left -= run.slots * (next - at);
    }
    // A thousandth of a millisecond of CPU is rounding, not work.
    for (const run of left.filter(({ left: rest }) => rest < 1e-3)) {
      const worked = (next - (firstRun.get(run.work.submissionId) ?? at)) / 1000;
      const plusMinusS = Math.max(1, relativeError(run.work.done) * worked);
      ends.set(run.work.submissionId, { at: new Date(next), plusMinusS });
    }
    left = left.filter(({ left: rest }) => rest >= 1e-3);
    at = next;
  }
  return { bars, ends };
}

function assignSlots(left: Running[], night: boolean, { slots, people }: ForecastSettings): void {
  for (const run of left) run.slots = 0;
  let free = slots;
  const held = new Map<string, number>();
  for (const when of night ? (['tonight', 'now'] as const) : (['now'] as const)) {
    const due = left.filter(({ work }) => work.when === when);
    const accounts = [...new Set(due.map(({ work }) => work.accountId))];
    const demands = accounts.map((key) => {
      const { weight = 1, maxSlots = slots } = people.get(key) ?? {};
      const wanted = due.filter(({ work }) => work.accountId === key).reduce((sum, run) => sum + most(run), 0);
      return { key, weight, most: Math.min(wanted, Math.max(0, maxSlots - (held.get(key) ?? 0))) };
    });
    for (const [key, share] of shareSlots(free, demands)) {
      let rest = share;
      for (const run of due.filter(({ work }) => work.accountId === key)) {
        run.slots = Math.min(rest, most(run));
        rest -= run.slots;
      }
      held.set(key, (held.get(key) ?? 0) + share);
      free -= share;
    }
  }
}

/** The last parts cannot be spread over more slots than there are parts. */
const most = ({ left, work }: Running) => Math.max(1, Math.ceil(left / Math.max(1, work.partMs) - 1e-9));

function addBar(bars: ForecastBar[], { work, slots }: Running, from: number, to: number): void {
  const last = bars.findLast(({ submissionId }) => submissionId === work.submissionId);
  if (last && last.to.getTime() === from && Math.abs(last.slots - slots) < 1e-6) last.to = new Date(to);
  else {
    const { submissionId, accountId } = work;
    bars.push({ submissionId, accountId, from: new Date(from), to: new Date(to), slots });
  }
}
