import { createHash } from 'node:crypto';
import { readFileSync } from 'node:fs';
import { fileURLToPath } from 'node:url';
import { manifestOf, models } from '@nightcone/models';
import asc from 'assemblyscript/asc';
import { addCustomSection } from '../custom-section.ts';
import { MANIFEST_SECTION } from '../manifest.ts';

const packageFolder = new URL('../../', import.meta.url);
const readText = (path: string) => readFileSync(new URL(path, packageFolder), 'utf8');

export interface CompiledKernel {
  bytes: Uint8Array<ArrayBuffer>;
  digest: string;
}

/**
 * Compiles assembly/ and appends the manifest. The same sources give the same bytes in any folder: the compiler's
 * version is pinned, its configuration file is always named, and nothing of the surroundings enters.
 * `testEntry` (a path under assembly/) adds the exports of a test-only entry; such a module is never released.
 */
export async function compileKernel(testEntry?: string): Promise<CompiledKernel> {
  const code = await compile(testEntry ? [testEntry] : []);
  const { version } = JSON.parse(readText('package.json')) as { version: string };
  const manifest = new TextEncoder().encode(canonicalJson(manifestOf(models, version)));
  const bytes = addCustomSection(code, MANIFEST_SECTION, manifest);
  return { bytes, digest: createHash('sha256').update(bytes).digest('hex') };
}

async function compile(extraEntries: string[]): Promise<Uint8Array> {
  let binary: Uint8Array | undefined;
  const messages: string[] = [];
  const text = { write: (chunk: string | Uint8Array) => void messages.push(String(chunk)) };
  const { error } = await asc.main(
    [...extraEntries, '--baseDir', fileURLToPath(packageFolder), '--config', 'asconfig.json', '--target', 'release'],
    {
      stdout: text,
      stderr: text,
      writeFile: (name, contents) => {
        if (name.endsWith('.wasm')) binary = contents as Uint8Array;
      },
    },
  );
  if (error || !binary) throw new Error(`The kernel does not compile.\n${messages.join('')}`, { cause: error });
  return binary;
}

/** RFC 8785 for values without undefined: keys sorted by UTF-16 units, numbers and strings as JSON.stringify writes them. */
function canonicalJson(value: unknown): string {
  if (Array.isArray(value)) return `[${value.map(canonicalJson).join(',')}]`;
  if (typeof value !== 'object' || value === null) return JSON.stringify(value);
  const members = Object.entries(value).sort(([a], [b]) => (a < b ? -1 : 1));
  return `{${members.map(([key, member]) => `${JSON.stringify(key)}:${canonicalJson(member)}`).join(',')}}`;
}
