import { createWriteStream } from 'node:fs';
import { Readable } from 'node:stream';
import { pipeline } from 'node:stream/promises';
import { csvChunks, jsonChunks, npzChunks, type ResultRecord, readNpz, readResultJson } from '@nightcone/provenance';
import { wrongInput } from './failure.ts';
import { readBytes } from './read-input.ts';

const writers: Record<string, (record: ResultRecord) => Iterable<string | Uint8Array>> = {
  npz: npzChunks,
  json: jsonChunks,
  csv: csvChunks,
};

/** The format that a file name asks for; wrong input for another ending. */
export function formatOf(path: string): 'npz' | 'json' | 'csv' {
  const ending = /\.(npz|json|csv)$/.exec(path)?.[1];
  if (ending === undefined) throw wrongInput('invalid-input', `“${path}” must end in .npz, .json or .csv.`);
  return ending as 'npz' | 'json' | 'csv';
}

export async function writeResult(path: string, record: ResultRecord): Promise<void> {
  const chunks = writers[formatOf(path)]?.(record) ?? [];
  await pipeline(Readable.from(chunks, { objectMode: true }), createWriteStream(path)).catch((error) => {
    throw wrongInput('invalid-input', `${path} cannot be written: ${error.message}.`);
  });
}

/** Reads a result file (.npz or JSON), told by its first bytes. Wrong input where it is none. */
export async function readResult(path: string): Promise<ResultRecord> {
  const bytes = await readBytes(path);
  try {
    return bytes[0] === 0x50 && bytes[1] === 0x4b ? readNpz(bytes) : readResultJson(new TextDecoder().decode(bytes));
  } catch (error) {
    throw wrongInput('invalid-input', `${path} is no result file: ${(error as Error).message}.`);
  }
}
