import { setTimeout as wait } from 'node:timers/promises';
import pg from 'pg';

export const channel = 'nightcone';

/**
 * What is told on the channel, after the commit of what it tells about:
 * `work` something may be started · `submission ID` its state or counts changed · `job HASH` its state changed ·
 * `cancel ID` and `pause ID` a submission must stop now · `quota ACCOUNT` a balance changed ·
 * `session ACCOUNT` a session or token of it ended ·
 * `connected` (from the listener itself) messages may have been missed before this one.
 */
export interface QueueMessage {
  topic: 'work' | 'submission' | 'job' | 'cancel' | 'pause' | 'quota' | 'session' | 'connected';
  id: string;
}

/** Listens until `stop` is called; connects again, after any loss, with a `connected` message each time. */
export function listen(
  connectionString: string,
  onMessage: (message: QueueMessage) => void,
  onError: (error: Error) => void = () => {},
): { stop: () => Promise<void> } {
  const stopping = new AbortController();
  let client: pg.Client | undefined;
  const session = () =>
    new Promise<void>((resolve) => {
      const mine = new pg.Client({ connectionString, keepAlive: true, connectionTimeoutMillis: 5_000 });
      client = mine;
      mine.on('error', (error) => {
        onError(error);
        resolve();
      });
      mine.on('end', resolve);
      mine.on('notification', ({ payload = '' }) => {
        const [topic, id = ''] = payload.split(' ');
        onMessage({ topic: topic as QueueMessage['topic'], id });
      });
      mine
        .connect()
        .then(() => mine.query(`listen ${channel}`))
        .then(
          () => onMessage({ topic: 'connected', id: '' }),
          (error: Error) => {
            onError(error);
            resolve();
          },
        );
    });
  const loop = (async () => {
    while (!stopping.signal.aborted) {
      await session();
      await client?.end().catch(() => {});
      if (!stopping.signal.aborted) await wait(500, undefined, { signal: stopping.signal }).catch(() => {});
    }
  })();
  return {
    stop: async () => {
      stopping.abort();
      await client?.end().catch(() => {});
      await loop;
    },
  };
}
