import { expect, test } from 'vitest';
import { type StartFacts, whyNotStarted } from './why-not-started.ts';

const free: StartFacts = {
  now: new Date('2026-02-12T16:40:00Z'),
  state: 'active',
  running: false,
  when: 'now',
  night: { from: new Date('2026-02-12T19:00:00Z'), to: new Date('2026-02-13T06:00:00Z'), open: false },
  timeZone: 'Europe/Berlin',
  slots: { total: 2, busy: 0 },
  memory: { neededBytes: 1e9, offeredBytes: 4e9 },
  quotaSpent: false,
  person: { running: 0, maxSlots: 8 },
  parked: false,
  ahead: { own: 0, people: 0 },
  nightWorkWaits: false,
};
const night = { ...free.night, open: true };
const busy = { total: 2, busy: 2 };

test.each<[string, Partial<StartFacts>, string]>([
  ['it runs', { running: true, state: 'active' }, ''],
  ['it has ended', { state: 'done' }, ''],
  ['it is cancelled', { state: 'cancelled', slots: { total: 0, busy: 0 } }, ''],
  ['it is paused', { state: 'paused' }, 'It is paused; it goes on when its owner resumes it.'],
  ['no worker', { slots: { total: 0, busy: 0 } }, 'No worker takes work at this moment; an admin can start one.'],
  [
    'the window is closed',
    { when: 'tonight' },
    'It is marked tonight and may start at 20:00 (Europe/Berlin), in 2 h 20 min.',
  ],
  [
    'the quota is used up',
    { quotaSpent: true },
    'The quota it is paid from is used up; it goes on when an admin grants more, or as a new submission next week.',
  ],
  [
    'it needs more memory than there is',
    { memory: { neededBytes: 9.1e9, offeredBytes: 4e9 } },
    'A part of it needs 9.1 GB of memory; no slot offers more than 4 GB.',
  ],
  [
    'others compute the same',
    { parked: true },
    'Its jobs are being computed for somebody else at this moment; the results will be shared.',
  ],
  [
    'the share is held',
    { person: { running: 1, maxSlots: 1 } },
    'Work of the same person holds one slot, and one person may hold at most 1.',
  ],
  ['own work first', { ahead: { own: 1, people: 0 } }, 'One submission of the same person goes first.'],
  ['own work first, several', { ahead: { own: 3, people: 1 } }, '3 submissions of the same person go first.'],
  [
    'the night is for the night',
    { night, nightWorkWaits: true },
    'Until 07:00 (Europe/Berlin) work marked tonight goes first.',
  ],
  [
    'others have the turn',
    { slots: busy, ahead: { own: 0, people: 2 } },
    'All 2 slots are busy, and 2 people have the turn before it.',
  ],
  ['it is next', { slots: busy }, 'It is next; all 2 slots are busy until a part ends.'],
  ['nothing is in its way', {}, 'It is next and starts within seconds.'],
])('%s', (_, change, sentence) => {
  expect(whyNotStarted({ ...free, ...change })).toBe(sentence);
});

test('what stops everything is said before the turn order', () => {
  const both = { ...free, quotaSpent: true, slots: { total: 2, busy: 2 }, ahead: { own: 1, people: 4 } };
  expect(whyNotStarted(both)).toMatch(/^The quota/);
});
