// Runs as a SharedWorker: one event stream for all tabs of this browser.
import { EventHub, type HubMessage } from './event-hub.ts';

const ports = new Set<MessagePort>();
let last: HubMessage | undefined;

const hub = new EventHub((message) => {
  if (message.type === 'connection') last = message;
  for (const port of ports) port.postMessage(message);
});

// The worker's global scope; the `webworker` types clash with those of the page.
const scope = globalThis as unknown as { onconnect: (event: MessageEvent) => void };
scope.onconnect = (event) => {
  const port = event.ports[0];
  if (!port) return;
  ports.add(port);
  port.onmessage = ({ data }) => {
    if (data !== 'bye') return;
    ports.delete(port);
    port.close();
    if (ports.size === 0) hub.close();
  };
  port.start();
  if (last) port.postMessage(last);
  hub.open();
};
