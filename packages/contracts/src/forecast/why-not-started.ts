import type { NightWindow } from '../night/night-window.ts';
import type { SubmissionState } from '../states.ts';

/** What decides whether a submission may start now. */
export interface StartFacts {
  now: Date;
  state: SubmissionState;
  /** A slot computes for it at this moment. */
  running: boolean;
  when: 'now' | 'tonight';
  night: NightWindow;
  timeZone: string;
  slots: { total: number; busy: number };
  /** Peak of one part, and the most that a slot offers. */
  memory: { neededBytes: number; offeredBytes: number };
  /** The balance it is paid from is used up. */
  quotaSpent: boolean;
  /** Of the person who submitted it. */
  person: { running: number; maxSlots: number };
  /** Everything left is being computed for somebody else at this moment. */
  parked: boolean;
  /** The person's own submissions that go first, and other people whose turn comes first. */
  ahead: { own: number; people: number };
  /** There is waiting work marked tonight. */
  nightWorkWaits: boolean;
}

const count = (n: number, one: string, many: string) => (n === 1 ? `one ${one}` : `${n} ${many}`);
const gigabytes = (bytes: number) => `${(bytes / 1e9).toLocaleString('en', { maximumFractionDigits: 1 })} GB`;

function clock(at: Date, timeZone: string): string {
  return at.toLocaleTimeString('en-GB', { timeZone, hour: '2-digit', minute: '2-digit', hourCycle: 'h23' });
}
function duration(ms: number): string {
  const minutes = Math.max(1, Math.round(ms / 60_000));
  const [hours, rest] = [Math.floor(minutes / 60), minutes % 60];
  return [hours > 0 ? `${hours} h` : '', rest > 0 || hours === 0 ? `${rest} min` : ''].filter(Boolean).join(' ');
}

/**
 * 'Why has it not started?' as a sentence that can be forwarded; empty once it runs or has ended. The rules are asked in
 * the order in which the queue applies them: what stops everything first, the turn order last.
 */
export function whyNotStarted(facts: StartFacts): string {
  const { state, running, when, night, timeZone, slots, memory, person, ahead } = facts;
  if (running || state === 'done' || state === 'cancelled') return '';
  if (state === 'paused') return 'It is paused; it goes on when its owner resumes it.';
  if (slots.total === 0) return 'No worker takes work at this moment; an admin can start one.';
  if (when === 'tonight' && !night.open)
    return `It is marked tonight and may start at ${clock(night.from, timeZone)} (${timeZone}), in ${duration(night.from.getTime() - facts.now.getTime())}.`;
  if (facts.quotaSpent)
    return 'The quota it is paid from is used up; it goes on when an admin grants more, or as a new submission next week.';
  if (memory.neededBytes > memory.offeredBytes)
    return `A part of it needs ${gigabytes(memory.neededBytes)} of memory; no slot offers more than ${gigabytes(memory.offeredBytes)}.`;
  if (facts.parked) return 'Its jobs are being computed for somebody else at this moment; the results will be shared.';
  if (person.running >= person.maxSlots)
    return `Work of the same person holds ${count(person.running, 'slot', 'slots')}, and one person may hold at most ${person.maxSlots}.`;
  if (ahead.own > 0)
    return `${capital(count(ahead.own, 'submission', 'submissions'))} of the same person ${ahead.own === 1 ? 'goes' : 'go'} first.`;
  if (when === 'now' && night.open && facts.nightWorkWaits)
    return `Until ${clock(night.to, timeZone)} (${timeZone}) work marked tonight goes first.`;
  if (ahead.people > 0)
    return `All ${slots.total} slots are busy, and ${count(ahead.people, 'person has', 'people have')} the turn before it.`;
  if (slots.busy >= slots.total) return `It is next; all ${slots.total} slots are busy until a part ends.`;
  return 'It is next and starts within seconds.';
}

const capital = (text: string) => text.charAt(0).toUpperCase() + text.slice(1);
