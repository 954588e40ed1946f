import { mkdirSync, readFileSync, renameSync, writeFileSync } from 'node:fs';
import { compileKernel } from './compile-kernel.ts';

/**
 * npm run build -w @nightcone/kernel [-- --update-lock]
 *
 * Writes build/kernel.wasm and compares its digest with kernel.lock.json. Another digest than the locked one is an
 * error: either the surroundings changed the bytes, or the change is meant and the lock is updated with it.
 */
const lockFile = new URL('../../kernel.lock.json', import.meta.url);
const folder = new URL('../../build/', import.meta.url);

const kernel = await compileKernel();
mkdirSync(folder, { recursive: true });
// renamed into place: a process that loads the kernel meanwhile sees the old file or the new one
const partial = new URL(`kernel.${process.pid}.partial`, folder);
writeFileSync(partial, kernel.bytes);
renameSync(partial, new URL('kernel.wasm', folder));

const lock = { digest: kernel.digest, bytes: kernel.bytes.length };
if (process.argv.includes('--update-lock')) {
  writeFileSync(lockFile, `${JSON.stringify(lock, null, 2)}\n`);
}
const locked = JSON.parse(readFileSync(lockFile, 'utf8')) as typeof lock;
console.log(`kernel ${kernel.digest} (${kernel.bytes.length} bytes)`);
if (locked.digest !== kernel.digest) {
  console.error(
    `kernel.lock.json expects ${locked.digest}. If the kernel was meant to change, run the build with --update-lock.`,
  );
  process.exitCode = 1;
}
