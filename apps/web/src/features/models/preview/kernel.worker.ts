/// <reference lib="webworker" />
import { type KernelInstance, KernelRefusal, openKernel } from '@nightcone/kernel';
import type { RunAnswer, RunRequest } from './messages.ts';

/**
 * One kernel in a thread of the browser. Between slices it looks whether a newer question has arrived and then drops
 * the older one; a page that cannot wait for the end of a slice ends the whole worker.
 */
declare const self: DedicatedWorkerGlobalScope;

const modules = new Map<string, Promise<WebAssembly.Module>>();
let opened: { digest: string; kernel: KernelInstance } | null = null;
let newest = 0;

const say = (answer: RunAnswer, transfer: Transferable[] = []) => self.postMessage(answer, transfer);

self.onmessage = (event: MessageEvent<RunRequest>) => {
  newest = event.data.id;
  void run(event.data);
};

async function run(request: RunRequest): Promise<void> {
  const { id, digest, specification } = request;
  say({ id, type: 'taken' });
  try {
    const kernel = await kernelOf(digest, request.moduleUrl);
    if (id !== newest) return;
    const started = performance.now();
    kernel.open(specification);
    const payloads: Uint8Array[] = [];
    let yielded = started;
    for (let i = 0; i < kernel.sliceCount(); i++) {
      payloads.push(kernel.computeSlice(i));
      if (performance.now() - yielded > 8) {
        await nextTurn();
        if (id !== newest) return;
        yielded = performance.now();
      }
    }
    const { arrays, certificate } = kernel.assemble(payloads);
    kernel.close();
    // every array gets bytes of its own, so that they can be handed over instead of copied again
    const own = arrays.map((array) => ({ ...array, bytes: array.bytes.slice() }));
    say(
      { id, type: 'done', arrays: own, certificate, ms: performance.now() - started },
      own.map((array) => array.bytes.buffer),
    );
  } catch (error) {
    if (id !== newest) return;
    if (error instanceof KernelRefusal) {
      say({ id, type: 'refused', status: error.status, message: error.message });
      return;
    }
    // the memory of a crashed machine is not to be trusted
    opened = null;
    say({ id, type: 'failed', message: error instanceof Error ? error.message : String(error) });
  }
}

async function kernelOf(digest: string, url: string): Promise<KernelInstance> {
  if (opened?.digest === digest) return opened.kernel;
  const loading = modules.get(digest) ?? loadModule(url);
  modules.set(digest, loading);
  try {
    const kernel = openKernel(await loading);
    opened = { digest, kernel };
    return kernel;
  } catch (error) {
    modules.delete(digest);
    throw error;
  }
}

async function loadModule(url: string): Promise<WebAssembly.Module> {
  const response = await fetch(url);
  if (!response.ok) throw new Error(`the program did not arrive (${response.status})`);
  return WebAssembly.compile(await response.arrayBuffer());
}

/** Lets waiting messages in. A message channel is not throttled as timers are. */
function nextTurn(): Promise<void> {
  return new Promise((done) => {
    const { port1, port2 } = new MessageChannel();
    port1.onmessage = () => {
      port1.close();
      done();
    };
    port2.postMessage(null);
  });
}
