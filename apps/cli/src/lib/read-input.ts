import { readFile } from 'node:fs/promises';
import type { Terminal } from './command.ts';
import { wrongInput } from './failure.ts';

/** The bytes of a file; wrong input where it cannot be read. */
export async function readBytes(path: string): Promise<Uint8Array> {
  try {
    return await readFile(path);
  } catch (error) {
    const { code } = error as NodeJS.ErrnoException;
    const why = code === 'ENOENT' ? 'there is no such file' : code === 'EISDIR' ? 'it is a folder' : `${code}`;
    throw wrongInput('invalid-input', `${path} cannot be read: ${why}.`);
  }
}

/** JSON from a file, or from standard input for `-`. */
export async function readJson(path: string, terminal: Terminal): Promise<unknown> {
  const text = path === '-' ? await terminal.stdin() : new TextDecoder().decode(await readBytes(path));
  try {
    return JSON.parse(text);
  } catch (error) {
    const name = path === '-' ? 'Standard input' : path;
    throw wrongInput('invalid-input', `${name} is no JSON: ${(error as Error).message}.`);
  }
}
