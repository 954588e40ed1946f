import { type Forecast, forecast, type NightWindow, nightWindow, type OpenWork } from '@nightcone/contracts';
import {
  findCapacity,
  findSettings,
  listOpenSubmissions,
  listTurnTags,
  type Queryable,
  type SettingsRow,
  type SubmissionRow,
} from '@nightcone/db';

/** The queue at one moment, and what it will probably do. */
export interface Schedule {
  now: Date;
  settings: SettingsRow;
  night: NightWindow;
  capacity: Awaited<ReturnType<typeof findCapacity>>;
  open: SubmissionRow[];
  tags: Map<string, number>;
  forecast: Forecast;
}

const week = 7 * 86_400_000;

/** `extra` is work that is only thought of: an estimate asks when it would end. */
export async function readSchedule(db: Queryable, extra: readonly OpenWork[] = []): Promise<Schedule> {
  const [settings, capacity, open, tags] = await Promise.all([
    findSettings(db),
    findCapacity(db),
    listOpenSubmissions(db),
    listTurnTags(db),
  ]);
  const now = new Date();
  const base = { now, settings, night: nightWindow(now, settings), capacity, open, tags };
  return { ...base, forecast: forecastWith(base, extra) };
}

/** The forecast as it would be with further work. */
export function forecastWith(
  { now, settings, capacity, open }: Omit<Schedule, 'forecast'>,
  extra: readonly OpenWork[],
): Forecast {
  const people = new Map(
    open.map((row) => [row.accountId, { weight: row.weight, maxSlots: row.personSlots ?? settings.maxSlots }]),
  );
  for (const { accountId } of extra)
    if (!people.has(accountId)) people.set(accountId, { weight: 1, maxSlots: settings.maxSlots });
  return forecast([...open.map((row) => openWork(row, capacity.speed)), ...extra], {
    now,
    slots: capacity.slots,
    people,
    nightAt: (at) => nightWindow(at, settings),
    horizon: new Date(now.getTime() + week),
  });
}

/** What is left of a submission: parts that wait or are with a slot, each as long as the parts so far have taught. */
function openWork(row: SubmissionRow, speed: number): OpenWork {
  const parts = row.waitingParts + Math.max(0, row.openParts - row.recordedOpenParts);
  return {
    submissionId: row.id,
    accountId: row.accountId,
    when: row.tonight ? 'tonight' : 'now',
    paused: row.state === 'paused' || row.quotaSpent,
    priority: row.priority,
    createdAt: row.createdAt,
    remainingMs: (parts * row.partMs) / speed,
    partMs: row.partMs / speed,
    done: row.totalSlices > 0 ? row.doneSlices / row.totalSlices : 0,
  };
}
