export type HubMessage =
  | { type: 'change'; data: string }
  /** `again`: the stream was lost in between, so anything may have changed. */
  | { type: 'connection'; connected: boolean; again: boolean };

/** EventSource mends broken connections by itself, but gives up after an HTTP error (a server that restarts). */
const reopenAfterMs = 4000;

/** Owns one EventSource and says what it hears. */
export class EventHub {
  private source: EventSource | undefined;
  private timer: ReturnType<typeof setTimeout> | undefined;
  private wasOpen = false;
  private readonly say: (message: HubMessage) => void;

  constructor(say: (message: HubMessage) => void) {
    this.say = say;
  }

  open(): void {
    if (this.source) return;
    const source = new EventSource('/api/v1/events');
    this.source = source;
    source.onopen = () => {
      this.say({ type: 'connection', connected: true, again: this.wasOpen });
      this.wasOpen = true;
    };
    source.onerror = () => {
      this.say({ type: 'connection', connected: false, again: false });
      if (source.readyState !== EventSource.CLOSED) return;
      this.source = undefined;
      this.timer = setTimeout(() => this.open(), reopenAfterMs);
    };
    const hear = (event: MessageEvent<string>) => this.say({ type: 'change', data: event.data });
    source.addEventListener('message', hear);
    source.addEventListener('change', hear);
  }

  close(): void {
    clearTimeout(this.timer);
    this.source?.close();
    this.source = undefined;
    this.wasOpen = false;
  }
}
