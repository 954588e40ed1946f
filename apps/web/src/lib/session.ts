import type { Session } from '@nightcone/contracts';
import { useApi } from './query.ts';

const fallback: Session['group'] = { name: 'Nightcone', timeZone: 'UTC', nightFrom: '20:00', nightTo: '06:00' };

/** Who is signed in and the group's settings; loaded once by the layout, read everywhere from the cache. */
export function useSession() {
  const query = useApi('getSession', undefined, { staleTime: Number.POSITIVE_INFINITY });
  return {
    query,
    account: query.data?.account ?? null,
    group: query.data?.group ?? fallback,
    kernel: query.data?.kernel ?? null,
  };
}

/** The group's time zone, in which every clock time is shown. */
export const useTimeZone = (): string => useSession().group.timeZone;
