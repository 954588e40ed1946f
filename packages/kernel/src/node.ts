import { createHash } from 'node:crypto';
import { readFile } from 'node:fs/promises';
import type { KernelManifest } from '@nightcone/models';
import { readManifest } from './manifest.ts';

export * from './index.ts';

export interface LoadedKernel {
  /** SHA-256 of the module's bytes, 64 hex digits: the kernel's name. */
  digest: string;
  bytes: Uint8Array<ArrayBuffer>;
  /** Compiled once; may be posted to worker threads. */
  module: WebAssembly.Module;
  manifest: KernelManifest;
}

export const currentKernelFile = new URL('../build/kernel.wasm', import.meta.url);

/** The kernel that `npm run build -w @nightcone/kernel` made last. */
export async function loadCurrentKernel(): Promise<LoadedKernel> {
  return loadKernelBytes(await readFile(currentKernelFile));
}

/** Compiles a kernel from its bytes, e.g. a released one; refuses bytes that are no kernel. */
export async function loadKernelBytes(source: Uint8Array): Promise<LoadedKernel> {
  const bytes = new Uint8Array(source); // a copy of its own: files may share a pool
  const module = await WebAssembly.compile(bytes);
  return { digest: createHash('sha256').update(bytes).digest('hex'), bytes, module, manifest: readManifest(module) };
}
