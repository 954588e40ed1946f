import { openSync, readSync } from 'node:fs';

/** Processor time of the calling thread, in milliseconds since the thread began. */
export interface CpuClock {
  /** `wall`: this system does not tell the processor time of a thread, so elapsed time stands in. */
  readonly source: 'thread' | 'wall';
  readMs(): number;
}

/**
 * The first number of /proc/thread-self/schedstat is the time on the processor in nanoseconds, brought up to date at
 * every scheduler tick (1 to 10 ms). Differences of consecutive readings add up exactly; one of them may be a tick off.
 */
export function openCpuClock(path = '/proc/thread-self/schedstat'): CpuClock {
  let file: number;
  try {
    file = openSync(path, 'r');
  } catch {
    return { source: 'wall', readMs: () => performance.now() };
  }
  const text = Buffer.alloc(64);
  return {
    source: 'thread',
    readMs() {
      const length = readSync(file, text, 0, text.length, 0);
      return Number.parseInt(text.toString('latin1', 0, length), 10) / 1e6;
    },
  };
}
