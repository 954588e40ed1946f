import { Worker } from 'node:worker_threads';
import type { KernelManifest } from '@nightcone/models';
import { Refusal } from '../refusal.ts';
import type { FromThread, PlanSummary, ToThread } from './messages.ts';
import type { PlannedPoint, Question } from './plan-question.ts';

export interface PlanRequest {
  kernel: { digest: string; manifest: KernelManifest };
  question: Question;
  /** With canonical texts and question digests, as a submission needs them. */
  full: boolean;
  signal: AbortSignal;
  /** Called for one batch after the other; the thread makes the next one meanwhile no faster than this answers. */
  onBatch: (points: PlannedPoint[]) => Promise<void> | void;
}

interface Running {
  request: PlanRequest;
  resolve: (summary: PlanSummary) => void;
  reject: (error: Error) => void;
}

/** Plans sweeps in a thread of its own, so that parsing and hashing 100 000 points never hold the event loop. */
export class Planner {
  readonly #loadKernel: (digest: string) => Promise<Uint8Array>;
  readonly #running = new Map<number, Running>();
  #thread: Worker | undefined;
  #sent = new Map<string, Promise<void>>();
  #nextId = 1;

  constructor(loadKernel: (digest: string) => Promise<Uint8Array>) {
    this.#loadKernel = loadKernel;
  }

  /** Rejects with a Refusal for what cannot be asked, with the signal's reason when the caller has left. */
  async plan(request: PlanRequest): Promise<PlanSummary> {
    const { kernel, question, full, signal } = request;
    signal.throwIfAborted();
    const thread = this.#start();
    await this.#sendKernel(thread, kernel);
    signal.throwIfAborted();
    const id = this.#nextId++;
    const post = (message: ToThread) => thread.postMessage(message);
    const stop = () => {
      this.#running.get(id)?.reject(signal.reason as Error);
      post({ type: 'stop', id });
    };
    try {
      return await new Promise<PlanSummary>((resolve, reject) => {
        this.#running.set(id, { request, resolve, reject });
        signal.addEventListener('abort', stop, { once: true });
        post({ type: 'plan', id, kernel: kernel.digest, question, full });
      });
    } catch (error) {
      if (!signal.aborted) post({ type: 'stop', id });
      throw error;
    } finally {
      signal.removeEventListener('abort', stop);
      this.#running.delete(id);
    }
  }

  async stop(): Promise<void> {
    await this.#thread?.terminate();
  }

  #start(): Worker {
    if (this.#thread) return this.#thread;
    const thread = new Worker(new URL('./boot-thread.mjs', import.meta.url));
    const lost = (error: Error) => {
      if (this.#thread === thread) this.#thread = undefined;
      this.#sent = new Map();
      for (const { reject } of this.#running.values()) reject(error);
    };
    thread.on('message', (message: FromThread) => void this.#hear(thread, message));
    thread.on('error', lost);
    thread.on('exit', (code) => lost(new Error(`the planning thread ended with ${code}`)));
    thread.unref();
    this.#thread = thread;
    return thread;
  }

  #sendKernel(thread: Worker, { digest, manifest }: PlanRequest['kernel']): Promise<void> {
    const known = this.#sent.get(digest);
    if (known) return known;
    const sending = this.#loadKernel(digest).then((bytes) => {
      thread.postMessage({ type: 'kernel', digest, manifest, bytes } satisfies ToThread);
    });
    this.#sent.set(digest, sending);
    sending.catch(() => this.#sent.delete(digest));
    return sending;
  }

  async #hear(thread: Worker, message: FromThread): Promise<void> {
    const plan = this.#running.get(message.id);
    if (!plan) return;
    if (message.type === 'done') plan.resolve(message.summary);
    else if (message.type === 'refused') plan.reject(new Refusal(message.code, message.detail, message.more));
    else if (message.type === 'broken') plan.reject(new Error(message.text));
    else {
      try {
        await plan.request.onBatch(message.points);
        thread.postMessage({ type: 'next', id: message.id } satisfies ToThread);
      } catch (error) {
        plan.reject(error as Error);
      }
    }
  }
}
