import { isTransient, listen } from '@nightcone/db';

export interface Watch {
  /** Resolves with the first answer that is not null or false; asks at every message of the queue, and four times a second. */
  until<T>(what: string, ask: () => Promise<T | null | false>, timeoutMs?: number): Promise<T>;
  stop(): Promise<void>;
}

/** A server that restarts has no answer yet. */
function nullWhileAway(error: unknown): null {
  if (!isTransient(error)) throw error;
  return null;
}

/** Waits for states of a database instead of for times. */
export function watchDatabase(url: string): Watch {
  const wakers = new Set<() => void>();
  const listener = listen(url, () => {
    for (const wake of wakers) wake();
  });
  const nextChange = () =>
    new Promise<void>((resolve) => {
      const wake = () => {
        clearTimeout(timer);
        wakers.delete(wake);
        resolve();
      };
      const timer = setTimeout(wake, 250);
      wakers.add(wake);
    });
  return {
    async until(what, ask, timeoutMs = 30_000) {
      const deadline = performance.now() + timeoutMs;
      for (;;) {
        const answer = await ask().catch(nullWhileAway);
        if (answer !== null && answer !== false) return answer;
        if (performance.now() > deadline) throw new Error(`waited ${timeoutMs} ms in vain until ${what}`);
        await nextChange();
      }
    },
    stop: () => listener.stop(),
  };
}
