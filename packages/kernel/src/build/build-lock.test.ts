import { execFile } from 'node:child_process';
import { createHash } from 'node:crypto';
import { mkdtempSync, readFileSync, rmSync, writeFileSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { fileURLToPath } from 'node:url';
import { promisify } from 'node:util';
import { manifestOf, models } from '@nightcone/models';
import { describe, expect, it } from 'vitest';
import { addCustomSection } from '../custom-section.ts';
import { currentKernelFile, loadCurrentKernel } from '../node.ts';

const locked = JSON.parse(readFileSync(new URL('../../kernel.lock.json', import.meta.url), 'utf8')) as {
  digest: string;
  bytes: number;
};

describe('the build', () => {
  it('gives the locked bytes from another folder, whatever compiler configuration lies there', async () => {
    const elsewhere = mkdtempSync(join(tmpdir(), 'kernel-build-'));
    try {
      writeFileSync(join(elsewhere, 'asconfig.json'), '{"targets":{"release":{"optimizeLevel":0,"noAssert":false}}}');
      const script = fileURLToPath(new URL('../../testing/print-kernel-digest.ts', import.meta.url));
      const { stdout } = await promisify(execFile)(process.execPath, ['--import', import.meta.resolve('tsx'), script], {
        cwd: elsewhere,
      });
      expect(stdout.trim()).toBe(locked.digest);
    } finally {
      rmSync(elsewhere, { recursive: true });
    }
  }, 180_000);

  it('left the locked kernel in build/', () => {
    const bytes = readFileSync(currentKernelFile);
    expect({ digest: createHash('sha256').update(bytes).digest('hex'), bytes: bytes.length }).toEqual(locked);
  });

  it('carries the manifest of the definitions, without anything for display', async () => {
    const { manifest } = await loadCurrentKernel();
    expect(manifest).toEqual(JSON.parse(JSON.stringify(manifestOf(models, manifest.version))));
    expect(JSON.stringify(manifest)).not.toMatch(/"(display|title|symbol|help)"/);
  });

  it('adds a section without touching the code', () => {
    const bytes = readFileSync(currentKernelFile);
    const text = new TextEncoder().encode('{"é":1}');
    const more = addCustomSection(bytes, 'another', text);
    expect(WebAssembly.validate(more)).toBe(true);
    expect(more.subarray(0, bytes.length)).toEqual(new Uint8Array(bytes));
    const [section] = WebAssembly.Module.customSections(new WebAssembly.Module(more), 'another');
    expect(new Uint8Array(section as ArrayBuffer)).toEqual(text);
  });
});
