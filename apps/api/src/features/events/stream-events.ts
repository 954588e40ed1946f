import type { ChangeEvent, endpoints } from '@nightcone/contracts';
import { isSignedIn, type QueueMessage } from '@nightcone/db';
import type { Caller, Context, Handler } from '../../context.ts';
import { mayHear } from './may-hear.ts';

const heartbeatMs = 20_000;
/** A busy sweep changes hundreds of times a second; a page needs to be told a few times. */
const gatherMs = 250;

/**
 * What has changed, as server-sent events without content: the page asks again for what it shows. Ends when the session
 * or token ends. A first comment tells the browser that the stream is open.
 */
export const streamEvents: Handler<typeof endpoints.streamEvents> = async ({ ctx }) => ({
  type: 'text/event-stream',
  cache: 'no-cache, no-transform',
  chunks: events(ctx),
});

async function* events({ services, caller, signal }: Context<typeof endpoints.streamEvents>): AsyncGenerator<string> {
  const { changes, db } = services;
  const waiting = new Map<string, QueueMessage>();
  let wake = () => {};
  const stopListening = changes.onChange((message) => {
    const own = message.topic !== 'session' || message.id === caller.account.id;
    if (own && (message.topic in kinds || message.topic === 'connected'))
      waiting.set(`${message.topic} ${message.id}`, message);
    if (own && waiting.size > 0) wake();
  });
  try {
    yield 'retry: 2000\n: open\n\n';
    while (!signal.aborted) {
      if (waiting.size === 0) {
        const woken = await new Promise<boolean>((resolve) => {
          const timer = setTimeout(resolve, heartbeatMs, false);
          wake = () => {
            clearTimeout(timer);
            resolve(true);
          };
          signal.addEventListener('abort', wake, { once: true });
        });
        signal.removeEventListener('abort', wake);
        if (!woken) yield ': still here\n\n';
        if (!woken || signal.aborted) continue;
        await pause(gatherMs, signal);
      }
      const batch = [...waiting.values()];
      waiting.clear();
      if (batch.some(({ topic }) => topic === 'session') && !(await isSignedIn(db, doorOf(caller)))) {
        yield write({ kind: 'session', id: 'ended' });
        return;
      }
      // Messages were missed while the database was away: the browser opens a new stream and asks for everything again.
      if (batch.some(({ topic }) => topic === 'connected')) return;
      for (const event of await tellable(services, caller, batch)) yield write(event);
    }
  } finally {
    stopListening();
  }
}

/** What each message of the database means to a page. */
const kinds: Partial<Record<QueueMessage['topic'], ChangeEvent['kind']>> = {
  job: 'job',
  submission: 'submission',
  quota: 'quota',
  session: 'session',
};

async function tellable(
  services: Context['services'],
  caller: Caller,
  batch: readonly QueueMessage[],
): Promise<ChangeEvent[]> {
  const events: ChangeEvent[] = [];
  for (const { topic, id } of batch) {
    const kind = kinds[topic];
    if (kind && kind !== 'session') events.push(...(await mayHear(services.db, caller, kind, id)));
  }
  return [...new Map(events.map((event) => [`${event.kind} ${event.id}`, event])).values()];
}

const doorOf = ({ sessionId, tokenId }: Caller) =>
  sessionId === undefined ? { tokenId: tokenId ?? '' } : { sid: sessionId };

const write = (event: ChangeEvent) => `event: change\ndata: ${JSON.stringify(event)}\n\n`;

const pause = (ms: number, signal: AbortSignal) =>
  new Promise<void>((resolve) => {
    const timer = setTimeout(done, ms);
    signal.addEventListener('abort', done, { once: true });
    function done() {
      clearTimeout(timer);
      signal.removeEventListener('abort', done);
      resolve();
    }
  });
