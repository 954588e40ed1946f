import { readdir, readFile } from 'node:fs/promises';
import { currentKernelFile, type LoadedKernel, loadKernelBytes } from '@nightcone/kernel/node';
import { exitCodes } from './exit-codes.ts';
import { CommandFailure, wrongInput } from './failure.ts';
import { readBytes } from './read-input.ts';

const releasesFolder = new URL('../releases/', currentKernelFile);

export type KernelFile = LoadedKernel & { state: 'current' | 'released' };

/** The current kernel; says how to make it where it was not built. */
export async function currentKernel(): Promise<LoadedKernel> {
  const bytes = await readFile(currentKernelFile).catch(() => undefined);
  if (bytes === undefined)
    throw new CommandFailure(exitCodes.failed, 'No kernel is built here: npm run build -w @nightcone/kernel');
  return loadKernelBytes(bytes);
}

/** Every kernel that can be run without network: the current one and all releases. */
export async function allKernels(): Promise<KernelFile[]> {
  const current = await currentKernel();
  const released = await Promise.all((await releaseNames()).map(readRelease));
  const others = released.filter(({ digest }) => digest !== current.digest);
  return [
    { ...current, state: 'current' as const },
    ...others.map((each) => ({ ...each, state: 'released' as const })),
  ];
}

/**
 * The kernel that a specification names (undefined: the current one), from `file` where one is given. Wrong input
 * where it is not here.
 */
export async function findKernel(digest: unknown, file?: string): Promise<LoadedKernel> {
  if (file !== undefined) {
    const given = await readKernelFile(file);
    if (digest !== undefined && digest !== given.digest)
      throw wrongInput('unknown-kernel', `The specification names kernel ${digest}, but ${file} is ${given.digest}.`);
    return given;
  }
  const current = await currentKernel();
  if (digest === undefined || digest === current.digest) return current;
  if (typeof digest === 'string' && /^[0-9a-f]{64}$/.test(digest)) {
    const name = (await releaseNames()).find((each) => each.endsWith(`-${digest.slice(0, 12)}.wasm`));
    const release = name === undefined ? undefined : await readRelease(name);
    if (release?.digest === digest) return release;
  }
  const detail = `Kernel ${JSON.stringify(digest)} is not here: the current one is ${current.digest}, releases are in packages/kernel/releases, and --kernel takes a module's file.`;
  const limit = 'the digest of a kernel that is at hand';
  throw wrongInput('unknown-kernel', detail, [{ field: '/kernel', message: detail, value: digest, limit }]);
}

async function readKernelFile(file: string): Promise<LoadedKernel> {
  const bytes = await readBytes(file);
  return loadKernelBytes(bytes).catch((error) => {
    throw wrongInput('unknown-kernel', `${file} is no kernel: ${error.message}`);
  });
}

async function releaseNames(): Promise<string[]> {
  const names = await readdir(releasesFolder).catch(() => []);
  return names.filter((name) => name.endsWith('.wasm')).sort();
}

const readRelease = async (name: string) => loadKernelBytes(await readFile(new URL(name, releasesFolder)));
