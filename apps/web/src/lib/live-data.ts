import type { ChangeEvent, EndpointId } from '@nightcone/contracts';
import type { QueryClient } from '@tanstack/react-query';
import { useEffect, useSyncExternalStore } from 'react';
import { changeOf, listenToEvents } from './events.ts';

/** Which answers a change makes stale; those that name the changed thing by its hash or id only for that one. */
const stale: Record<ChangeEvent['kind'], { all: EndpointId[]; byParam?: Partial<Record<EndpointId, 'hash' | 'id'>> }> =
  {
    job: { all: ['listJobs', 'getExecution'], byParam: { getJob: 'hash' } },
    submission: { all: ['listSubmissions', 'getNight', 'getLastNight'], byParam: { getSubmission: 'id' } },
    sweep: {
      all: ['listSweeps'],
      byParam: { getSweep: 'id', listSweepPoints: 'id', getSweepQuantity: 'id' },
    },
    queue: { all: ['getNight', 'listSubmissions', 'listWorkers'] },
    quota: { all: ['getQuota', 'listQuotaEntries'] },
    session: { all: ['getSession', 'listAccounts', 'listSessions'] },
  };

/** Does a query key `[endpoint, input]` become stale by this change? */
export function isStale(key: readonly unknown[], change: ChangeEvent): boolean {
  const endpoint = key[0] as EndpointId;
  const { all, byParam } = stale[change.kind];
  if (all.includes(endpoint)) return true;
  const param = byParam?.[endpoint];
  if (!param) return false;
  const input = key[1] as { params?: Record<string, unknown> } | undefined;
  return input?.params?.[param] === change.id;
}

/** Least time between two rounds of asking again: hundreds of jobs may end within a second. */
const roundMs = 400;

/**
 * Gathers changes and refreshes in rounds. A round begins only after the answers of the one before, so a slow answer
 * is never abandoned for a newer one, and the last change is always followed by one more round.
 */
export class Refresher {
  private readonly pending = new Map<string, ChangeEvent>();
  private everything = false;
  private running = false;
  private readonly client: QueryClient;
  private readonly pause: (ms: number) => Promise<void>;

  constructor(client: QueryClient, pause = (ms: number) => new Promise<void>((done) => setTimeout(done, ms))) {
    this.client = client;
    this.pause = pause;
  }

  add(change: ChangeEvent): void {
    this.pending.set(`${change.kind} ${change.id}`, change);
    void this.run();
  }
  all(): void {
    this.everything = true;
    void this.run();
  }

  private async run(): Promise<void> {
    if (this.running) return;
    this.running = true;
    while (this.everything || this.pending.size > 0) {
      const everything = this.everything;
      const changes = [...this.pending.values()];
      this.pending.clear();
      this.everything = false;
      await this.client.invalidateQueries({
        predicate: ({ queryKey }) => everything || changes.some((change) => isStale(queryKey, change)),
      });
      await this.pause(roundMs);
    }
    this.running = false;
  }
}

let connected = true;
const watchers = new Set<() => void>();
function setConnected(value: boolean) {
  connected = value;
  for (const watch of watchers) watch();
}

/** False while the stream is down: what stands on the page may be old. */
export function useConnected(): boolean {
  return useSyncExternalStore(
    (watch) => {
      watchers.add(watch);
      return () => watchers.delete(watch);
    },
    () => connected,
  );
}

/** Keeps the cache live while somebody is signed in. */
export function useLiveData(client: QueryClient, signedIn: boolean): void {
  useEffect(() => {
    if (!signedIn) return;
    const refresher = new Refresher(client);
    const stop = listenToEvents((message) => {
      if (message.type === 'connection') {
        setConnected(message.connected);
        if (message.connected && message.again) refresher.all();
        return;
      }
      const change = changeOf(message.data);
      if (change) refresher.add(change);
    });
    const offline = () => setConnected(false);
    const online = () => {
      setConnected(true);
      refresher.all();
    };
    window.addEventListener('offline', offline);
    window.addEventListener('online', online);
    return () => {
      window.removeEventListener('offline', offline);
      window.removeEventListener('online', online);
      stop();
      setConnected(true);
    };
  }, [client, signedIn]);
}
