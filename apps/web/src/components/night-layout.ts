import type { Night } from '@nightcone/contracts';

type Lane = Night['lanes'][number];
type Bar = Lane['bars'][number];

/** Clock time → x, from dusk to dawn. */
export interface NightScale {
  x(at: string | number): number;
  left: number;
  right: number;
}

const ms = (at: string | number) => (typeof at === 'number' ? at : Date.parse(at));

export function nightScale(night: Pick<Night, 'from' | 'to'>, left: number, right: number): NightScale {
  const from = ms(night.from);
  const span = Math.max(1, ms(night.to) - from);
  return {
    left,
    right,
    x: (at) => left + Math.min(1, Math.max(0, (ms(at) - from) / span)) * (right - left),
  };
}

const hourMs = 3_600_000;

/** Whole hours of the group's clock inside the night, as far apart as their labels need. */
export function hourMarks(night: Pick<Night, 'from' | 'to' | 'timeZone'>, width: number, leastGap: number) {
  const from = ms(night.from);
  const to = ms(night.to);
  const hourOf = new Intl.DateTimeFormat('en-GB', {
    hour: '2-digit',
    minute: '2-digit',
    hourCycle: 'h23',
    timeZone: night.timeZone,
  });
  const perHour = (width * hourMs) / Math.max(1, to - from);
  const step = [1, 2, 3, 6, 12].find((hours) => hours * perHour >= leastGap) ?? 12;
  const marks: { at: number; label: string; labelled: boolean }[] = [];
  // Zones are whole quarters of an hour away from UTC.
  for (let at = Math.ceil(from / 900_000) * 900_000; at <= to; at += 900_000) {
    const [hour = '', minute] = hourOf.format(at).split(':');
    if (minute === '00') marks.push({ at, label: hour, labelled: Number(hour) % step === 0 });
  }
  return marks;
}

export interface PlacedBar {
  bar: Bar;
  x: number;
  width: number;
  /** Distance of its foot above the foot of the lane. */
  offset: number;
  height: number;
}
export interface PlacedLane {
  lane: Lane;
  height: number;
  bars: PlacedBar[];
}

/** Height of one slot: 2.2 px; more where the whole machine has so few that the full height would be a thin line. */
export const slotHeight = (totalSlots: number): number => Math.max(2.2, 16 / Math.max(1, totalSlots));

/** Bars of one person: height ∝ slots, so area is CPU time; bars at the same time stand on each other. */
export function placeLane(lane: Lane, scale: NightScale, perSlot: number): PlacedLane {
  const placed: PlacedBar[] = [];
  for (const bar of [...lane.bars].sort((a, b) => ms(a.from) - ms(b.from))) {
    const x = scale.x(bar.from);
    const width = Math.max(1.5, scale.x(bar.to) - x);
    const height = Math.max(3, bar.slots * perSlot);
    const meets = placed.filter((other) => other.x + other.width > x + 0.01 && other.x < x + width - 0.01);
    let offset = 0;
    for (const other of meets.sort((a, b) => a.offset - b.offset)) {
      if (other.offset < offset + height && other.offset + other.height > offset) offset = other.offset + other.height;
    }
    placed.push({ bar, x, width, offset, height });
  }
  return { lane, bars: placed, height: placed.reduce((top, bar) => Math.max(top, bar.offset + bar.height), 0) };
}

export interface Twilight {
  from: number;
  to: number;
  /** 1 day … 4 night */
  step: 1 | 2 | 3 | 4;
}

const minute = 60_000;
/** Flat steps of twilight around the group's night window: minutes before it opens and after it closes. */
const steps: readonly [minutes: number, step: 1 | 2 | 3][] = [
  [100, 1],
  [60, 2],
  [20, 3],
];

/** The sky from dusk to dawn. It follows the night window, not the sun: the group's place is not known. */
export function twilight(night: Pick<Night, 'from' | 'to' | 'window'>): Twilight[] {
  const [from, to] = [ms(night.from), ms(night.to)];
  const [opens, closes] = [ms(night.window.from), ms(night.window.to)];
  const edges: Twilight[] = [];
  let start = from;
  for (const [minutes, step] of steps) {
    edges.push({ from: start, to: opens - minutes * minute, step });
    start = opens - minutes * minute;
  }
  let end = to;
  for (const [minutes, step] of steps) {
    edges.push({ from: closes + minutes * minute, to: end, step });
    end = closes + minutes * minute;
  }
  edges.push({ from: start, to: end, step: 4 });
  return edges
    .map((edge) => ({ ...edge, from: Math.max(from, edge.from), to: Math.min(to, edge.to) }))
    .filter((edge) => edge.to > edge.from)
    .sort((a, b) => a.from - b.from);
}
