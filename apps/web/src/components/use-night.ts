import type { Night } from '@nightcone/contracts';
import { useEffect, useState } from 'react';
import { useApi } from '../lib/query.ts';

/** The clock of the page moves on its own; the scheduler's estimates come with events. */
const tickMs = 30_000;

/** The night from the scheduler, with `now` moved on by the time since it was read. */
export function useNight(): { night: Night | undefined; now: number; query: ReturnType<typeof useApi<'getNight'>> } {
  const query = useApi('getNight');
  const [clock, setClock] = useState(() => Date.now());
  useEffect(() => {
    const timer = setInterval(() => setClock(Date.now()), tickMs);
    return () => clearInterval(timer);
  }, []);
  const night = query.data;
  const now = night ? Date.parse(night.now) + Math.max(0, clock - query.dataUpdatedAt) : clock;
  return { night, now, query };
}
