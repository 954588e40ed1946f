import type { RunAnswer, RunRequest } from './messages.ts';

/** The part of a worker that a runner uses. */
export interface WorkerLike {
  postMessage(message: RunRequest): void;
  terminate(): void;
  onmessage: ((event: MessageEvent<RunAnswer>) => void) | null;
  onerror: ((event: ErrorEvent) => void) | null;
}

/** A worker that has not taken a new question after this long sits in a slice: it is ended and replaced. */
export const patienceMs = 120;

/** Runs one question at a time and answers only for the newest. */
export class PreviewRunner {
  private worker: WorkerLike | null = null;
  private lastId = 0;
  /** The worker has answered once: silence now means work, not loading. */
  private awake = false;
  private timer: ReturnType<typeof setTimeout> | undefined;
  private readonly makeWorker: () => WorkerLike;
  private readonly onAnswer: (answer: RunAnswer) => void;

  constructor(makeWorker: () => WorkerLike, onAnswer: (answer: RunAnswer) => void) {
    this.makeWorker = makeWorker;
    this.onAnswer = onAnswer;
  }

  run(question: Omit<RunRequest, 'id'>): number {
    const id = ++this.lastId;
    const request = { ...question, id };
    this.post(request);
    clearTimeout(this.timer);
    this.timer = setTimeout(() => {
      if (!this.awake) return;
      this.drop();
      this.post(request);
    }, patienceMs);
    return id;
  }

  stop(): void {
    clearTimeout(this.timer);
    this.lastId++;
    this.drop();
  }

  private post(request: RunRequest): void {
    if (!this.worker) {
      this.worker = this.makeWorker();
      this.worker.onmessage = (event) => this.hear(event.data);
      this.worker.onerror = (event) =>
        this.hear({ id: this.lastId, type: 'failed', message: event.message || 'the worker did not start' });
    }
    this.worker.postMessage(request);
  }

  private hear(answer: RunAnswer): void {
    this.awake = true;
    if (answer.id !== this.lastId) return;
    clearTimeout(this.timer);
    if (answer.type !== 'taken') this.onAnswer(answer);
  }

  private drop(): void {
    if (!this.worker) return;
    this.worker.onmessage = null;
    this.worker.onerror = null;
    this.worker.terminate();
    this.awake = false;
    this.worker = null;
  }
}

export const makeKernelWorker = (): WorkerLike =>
  new Worker(new URL('./kernel.worker.ts', import.meta.url), { type: 'module', name: 'kernel' });
