import type { KernelResult, ResultArrayData } from '@nightcone/kernel';
import { unzipSync, Zip, ZipPassThrough } from 'fflate';
import { canonicalJson } from '../canonical.ts';
import { npyHeader, readNpy } from './npy.ts';
import type { ResultRecord } from './result-record.ts';

/** Member of the archive that holds everything but the arrays. */
export const recordMember = 'nightcone.json';

// Zip stores local date parts without a zone: made from parts, they are the same bytes in every time zone.
const mtime = new Date(1980, 0, 2);

/**
 * The result as a NumPy archive in pieces: one stored `.npy` per array and `nightcone.json` with the specification, the
 * hashes, the certificate and the notes. The same result gives the same bytes, wherever its parts were kept meanwhile.
 */
export function* npzChunks(record: ResultRecord): Generator<Uint8Array> {
  const pieces: Uint8Array[] = [];
  let failure: Error | null = null;
  const zip = new Zip((error, piece) => {
    failure ??= error;
    pieces.push(piece);
  });
  for (const [name, parts] of members(record)) {
    const entry = new ZipPassThrough(name);
    entry.mtime = mtime;
    zip.add(entry);
    for (const [i, part] of parts.entries()) entry.push(part, i === parts.length - 1);
    yield* pieces.splice(0);
  }
  zip.end();
  yield* pieces.splice(0);
  if (failure) throw failure;
}

function* members({
  specification,
  jobHash,
  resultDigest,
  result,
  notes,
}: ResultRecord): Generator<[string, Uint8Array[]]> {
  const arrays = result.arrays.map(({ bytes: _, ...rest }) => rest);
  const kernel = specification.kernel;
  const head = { jobHash, resultDigest, kernel, specification, arrays, certificate: result.certificate, notes };
  yield [recordMember, [new TextEncoder().encode(`${canonicalJson(head)}\n`)]];
  for (const array of result.arrays) yield [`${array.name}.npy`, [npyHeader(array), array.bytes]];
}

/** Reads an archive back. Throws SyntaxError where it is none of ours or an array is missing or of another kind. */
export function readNpz(file: Uint8Array): ResultRecord {
  let files: Record<string, Uint8Array>;
  try {
    // members are stored, never compressed: nothing can swell beyond the file
    files = unzipSync(file, { filter: ({ compression }) => compression === 0 });
  } catch (error) {
    throw new SyntaxError(`no readable archive: ${(error as Error).message}`);
  }
  const head = files[recordMember];
  if (head === undefined) throw new SyntaxError(`the archive has no ${recordMember}`);
  const { arrays, certificate, ...rest } = JSON.parse(new TextDecoder().decode(head)) as Omit<
    ResultRecord,
    'result'
  > & {
    arrays: Omit<ResultArrayData, 'bytes'>[];
    certificate: KernelResult['certificate'];
  };
  const read = arrays.map((array) => {
    const member = files[`${array.name}.npy`];
    if (member === undefined) throw new SyntaxError(`the archive has no array ${array.name}`);
    const { dtype, shape, bytes } = readNpy(member);
    if (dtype !== array.dtype || shape.join() !== array.shape.join())
      throw new SyntaxError(`the array ${array.name} has another type or shape than ${recordMember} says`);
    return { ...array, bytes };
  });
  const { specification, jobHash, resultDigest, notes } = rest;
  return { specification, jobHash, resultDigest, notes, result: { arrays: read, certificate } };
}
