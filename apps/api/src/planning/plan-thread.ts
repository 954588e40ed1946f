import { parentPort } from 'node:worker_threads';
import { Refusal } from '../refusal.ts';
import type { FromThread, ToThread } from './messages.ts';
import { type LoadedKernel, loadKernel } from './probe-kernel.ts';
import { type PlanControl, runPlan } from './run-plan.ts';

/** The planning thread: plans take turns batch by batch, so that a small one never waits for a large one. */
const port = parentPort;
if (!port) throw new Error('this file runs as a worker thread');
const send = (message: FromThread) => port.postMessage(message);

const kernels = new Map<string, LoadedKernel>();
const running = new Map<number, PlanControl>();

async function plan({ id, kernel: digest, question, full }: Extract<ToThread, { type: 'plan' }>): Promise<void> {
  let proceed = () => {};
  const control: PlanControl = {
    stopped: false,
    release: () => proceed(),
    sendBatch: (points) => {
      const dealtWith = new Promise<void>((resolve) => {
        proceed = resolve;
      });
      send({ type: 'batch', id, points });
      return dealtWith;
    },
  };
  running.set(id, control);
  try {
    const kernel = kernels.get(digest);
    if (!kernel) throw new Error(`kernel ${digest} was not sent`);
    const summary = await runPlan(kernel, question, full, control);
    if (summary) send({ type: 'done', id, summary });
  } catch (error) {
    if (error instanceof Refusal)
      send({ type: 'refused', id, code: error.code, detail: error.message, more: error.more });
    else send({ type: 'broken', id, text: error instanceof Error ? (error.stack ?? error.message) : String(error) });
  } finally {
    running.delete(id);
  }
}

port.on('message', (message: ToThread) => {
  if (message.type === 'kernel') kernels.set(message.digest, loadKernel(message));
  else if (message.type === 'plan') void plan(message);
  else {
    const control = running.get(message.id);
    if (!control) return;
    if (message.type === 'stop') control.stopped = true;
    control.release();
  }
});
