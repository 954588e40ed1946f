import { whyNotStarted } from '@nightcone/contracts';
import type { SubmissionRow } from '@nightcone/db';
import type { Schedule } from './read-schedule.ts';

const waits = (row: SubmissionRow, schedule: Schedule) =>
  row.state === 'active' && row.waitingParts > 0 && !row.quotaSpent && (!row.tonight || schedule.night.open);
/** Inside the night window work marked tonight goes before the rest. */
const rank = (row: SubmissionRow, schedule: Schedule) => (schedule.night.open && !row.tonight ? 1 : 0);

/** Negative when `a` goes before `b` among one person's own submissions, as the queue orders them. */
const byOwnTurn = (a: SubmissionRow, b: SubmissionRow, schedule: Schedule) =>
  rank(a, schedule) - rank(b, schedule) ||
  b.priority - a.priority ||
  a.ownTag - b.ownTag ||
  a.createdAt.getTime() - b.createdAt.getTime();

/** Why this submission has not started, or goes on no further; empty once it runs. */
export function explainWait(row: SubmissionRow, schedule: Schedule): string {
  const { now, settings, night, capacity, open, tags } = schedule;
  const others = open.filter((other) => other.id !== row.id && waits(other, schedule));
  const own = others.filter((other) => other.accountId === row.accountId && byOwnTurn(other, row, schedule) < 0);
  const tag = (id: string) => tags.get(id) ?? 0;
  const people = new Set(
    others
      .filter(({ accountId }) => accountId !== row.accountId)
      .filter(
        (other) =>
          rank(other, schedule) - rank(row, schedule) < 0 ||
          (rank(other, schedule) === rank(row, schedule) && tag(other.accountId) < tag(row.accountId)),
      )
      .map(({ accountId }) => accountId),
  );
  return whyNotStarted({
    now,
    state: row.state,
    running: row.leases > 0,
    when: row.tonight ? 'tonight' : 'now',
    night,
    timeZone: settings.timeZone,
    slots: { total: capacity.slots, busy: capacity.busy },
    memory: { neededBytes: row.memoryBytes, offeredBytes: capacity.memoryBytes },
    quotaSpent: row.quotaSpent,
    person: { running: row.personRunning, maxSlots: row.personSlots ?? settings.maxSlots },
    parked: row.waitingParts === 0 && row.parkedPoints > 0,
    ahead: { own: own.length, people: people.size },
    nightWorkWaits: others.some((other) => other.tonight),
  });
}
