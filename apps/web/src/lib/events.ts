import { ChangeEvent } from '@nightcone/contracts';
import { EventHub, type HubMessage } from './event-hub.ts';

/** Listens to the one stream of this browser; without SharedWorker each tab holds its own. Returns how to stop. */
export function listenToEvents(on: (message: HubMessage) => void): () => void {
  if (typeof SharedWorker !== 'function') {
    const hub = new EventHub(on);
    hub.open();
    return () => hub.close();
  }
  const worker = new SharedWorker(new URL('./events.shared.ts', import.meta.url), {
    type: 'module',
    name: 'nightcone-events',
  });
  worker.port.onmessage = (event: MessageEvent<HubMessage>) => on(event.data);
  worker.port.start();
  const leave = () => worker.port.postMessage('bye');
  addEventListener('pagehide', leave, { once: true });
  return () => {
    removeEventListener('pagehide', leave);
    leave();
  };
}

/** The change that a message names, if it is one. */
export function changeOf(data: string): ChangeEvent | undefined {
  try {
    return ChangeEvent.safeParse(JSON.parse(data)).data;
  } catch {
    return undefined;
  }
}
