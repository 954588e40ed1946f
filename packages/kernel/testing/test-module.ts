import { createHash } from 'node:crypto';
import { mkdirSync, readdirSync, readFileSync, renameSync, writeFileSync } from 'node:fs';
import { compileKernel } from '../src/build/compile-kernel.ts';

const folder = new URL('../build/testing/', import.meta.url);
const assembly = new URL('../assembly/', import.meta.url);

/**
 * The kernel with the exports of a test entry, `assembly/testing/<name>.ts`. Compiled once per state of the sources and
 * kept in build/testing.
 */
export async function compileTestKernel(name: string): Promise<WebAssembly.Module> {
  const file = new URL(`${name}-${sourceDigest()}.wasm`, folder);
  let bytes: Uint8Array;
  try {
    bytes = readFileSync(file);
  } catch {
    bytes = (await compileKernel(`assembly/testing/${name}.ts`)).bytes;
    mkdirSync(folder, { recursive: true });
    const partial = new URL(`${name}.${process.pid}.partial`, folder);
    writeFileSync(partial, bytes);
    renameSync(partial, file);
  }
  return WebAssembly.compile(new Uint8Array(bytes));
}

function sourceDigest(): string {
  const hash = createHash('sha256');
  const names = readdirSync(assembly, { recursive: true })
    .map(String)
    .filter((name) => name.endsWith('.ts'))
    .sort();
  for (const name of [...names, '../asconfig.json']) hash.update(readFileSync(new URL(name, assembly)));
  return hash.digest('hex').slice(0, 16);
}
