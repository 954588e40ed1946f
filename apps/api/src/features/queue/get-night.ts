import type { endpoints, Night, Span } from '@nightcone/contracts';
import { listPastWork } from '@nightcone/db';
import type { Handler } from '../../context.ts';
import { type Labels, readLabels } from '../../scheduling/people.ts';
import { readSchedule, type Schedule } from '../../scheduling/read-schedule.ts';
import { expected } from '../../scheduling/submission-view.ts';

const hour = 3_600_000;
const binMinutes = 10;
type Bar = Night['lanes'][number]['bars'][number];
interface LaneBar extends Bar {
  accountId: string;
}

/** Dusk is two hours before the window, dawn two hours after it; by day the strip begins with the present hour. */
export function stripSpan({ now, night }: Pick<Schedule, 'now' | 'night'>): Span {
  const dusk = night.from.getTime() - 2 * hour;
  const present = Math.floor(now.getTime() / hour) * hour;
  return { from: new Date(Math.min(dusk, present)), to: new Date(night.to.getTime() + 2 * hour) };
}

export const getNight: Handler<typeof endpoints.getNight> = async ({ ctx }) => {
  const { db } = ctx.services;
  const me = ctx.caller.account.id;
  const [schedule, labels] = await Promise.all([readSchedule(db), readLabels(db, ctx.caller)]);
  const { now, night, capacity, settings } = schedule;
  const span = stripSpan(schedule);
  const past = await listPastWork(db, span.from, now, binMinutes);
  const bars = [...doneBars(past, now), ...comingBars(schedule, span)];
  const mineOrAdmin = (id: string) => id === me || ctx.caller.account.role === 'admin';
  const shown = bars.map((bar) => ({
    ...bar,
    submissionId: mineOrAdmin(bar.accountId) ? bar.submissionId : null,
    title: bar.accountId === me ? bar.title : null,
  }));
  const myEnds = schedule.open
    .filter(({ accountId }) => accountId === me)
    .flatMap(({ id }) => schedule.forecast.ends.get(id) ?? []);
  const last = myEnds.toSorted((a, b) => b.at.getTime() - a.at.getTime())[0];
  return {
    from: span.from.toISOString(),
    to: span.to.toISOString(),
    now: now.toISOString(),
    timeZone: settings.timeZone,
    window: { from: night.from.toISOString(), to: night.to.toISOString(), open: night.open },
    lanes: lanes(shown, labels, me),
    myEnd: expected(last),
    slots: { total: capacity.slots, busy: Math.min(capacity.busy, capacity.slots) },
  };
};

/** Bins that follow each other are one bar of their mean height, so that its area is still the CPU time. */
function doneBars(past: Awaited<ReturnType<typeof listPastWork>>, now: Date): LaneBar[] {
  const bars: (LaneBar & { busyMs: number; start: number; end: number })[] = [];
  for (const { submissionId, accountId, title, from, busyMs } of past) {
    const start = from.getTime();
    const end = Math.min(start + binMinutes * 60_000, now.getTime());
    if (busyMs <= 0 || end <= start) continue;
    const last = bars.findLast((bar) => bar.submissionId === submissionId);
    if (last && last.end === start) {
      last.busyMs += busyMs;
      last.end = end;
    } else bars.push({ submissionId, accountId, title, state: 'done', from: '', to: '', slots: 0, busyMs, start, end });
  }
  return bars.map(({ busyMs, start, end, ...bar }) => ({
    ...bar,
    from: new Date(start).toISOString(),
    to: new Date(end).toISOString(),
    slots: busyMs / (end - start),
  }));
}

function comingBars({ forecast, open }: Schedule, span: Span): LaneBar[] {
  const rows = new Map(open.map((row) => [row.id, row]));
  return forecast.bars.flatMap(({ submissionId, accountId, from, to, slots }) => {
    if (from >= span.to) return [];
    const row = rows.get(submissionId);
    const state = row?.startedAt ? 'estimated' : 'waiting';
    const end = new Date(Math.min(to.getTime(), span.to.getTime()));
    const times = { from: from.toISOString(), to: end.toISOString() };
    return [{ submissionId, accountId, title: row?.title ?? null, state, ...times, slots } as const];
  });
}

/** One lane for each person, one's own first. */
function lanes(bars: LaneBar[], labels: Labels, me: string): Night['lanes'] {
  const people = [...new Set([me, ...bars.map(({ accountId }) => accountId)])];
  return people
    .map((id) => ({
      label: labels.person(id).label,
      name: labels.name(id),
      mine: id === me,
      bars: bars.filter(({ accountId }) => accountId === id).map(({ accountId: _, ...bar }) => bar),
    }))
    .toSorted((a, b) => Number(b.mine) - Number(a.mine) || a.label.localeCompare(b.label, 'en', { numeric: true }));
}
