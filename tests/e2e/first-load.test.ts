import fs from 'node:fs';
import { fileURLToPath } from 'node:url';
import { gzipSync } from 'node:zlib';
import { expect, test } from 'vitest';

interface Chunk {
  file: string;
  imports?: string[];
  isEntry?: boolean;
}
const dist = fileURLToPath(new URL('../../apps/web/dist/', import.meta.url));
const manifest: Record<string, Chunk> = JSON.parse(fs.readFileSync(`${dist}.vite/manifest.json`, 'utf8'));

/** JavaScript that the browser must load for these modules: the chunks and what they import statically. */
function gzipBytes(...modules: string[]): number {
  const files = new Set<string>();
  const add = (name: string) => {
    const chunk = manifest[name];
    if (!chunk) throw new Error(`${name} is not in the build`);
    if (files.has(chunk.file)) return;
    files.add(chunk.file);
    chunk.imports?.forEach(add);
  };
  modules.forEach(add);
  return [...files]
    .filter((file) => file.endsWith('.js'))
    .reduce((sum, file) => sum + gzipSync(fs.readFileSync(dist + file)).length, 0);
}

test.each(['src/features/accounts/sign-in-page.tsx', 'src/features/queue/tonight-page.tsx'])(
  '%s loads under 200 kB of gzipped JavaScript',
  (page) => {
    expect(gzipBytes('index.html', page)).toBeLessThan(200_000);
  },
);
