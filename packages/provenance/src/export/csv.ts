import type { ResultArrayData } from '@nightcone/kernel';
import { arrayValues } from '../array-values.ts';
import { placingOf } from '../ragged-layout.ts';
import { numberText } from './number-text.ts';
import type { ResultRecord } from './result-record.ts';

const rowsPerChunk = 1024;

/**
 * The result as comma-separated text in pieces. Lines that begin with `#` name job, result and kernel. Then one block
 * for all arrays along the same dimensions: a header line, one column per dimension (the coordinate where the result
 * holds one, `fieldT` for the dimension `field`, else the index from 0), one per array. Blocks are parted by an empty
 * line; numbers have 17 significant digits.
 */
export function* csvChunks(record: ResultRecord): Generator<string> {
  const { specification, jobHash, resultDigest, result } = record;
  yield `# model ${specification.model}\n# job ${jobHash}\n# result ${resultDigest}\n# kernel ${specification.kernel}\n`;
  const blocks = new Map<string, ResultArrayData[]>();
  for (const array of result.arrays) {
    const key = JSON.stringify([array.dims, array.shape, array.ragged]);
    blocks.set(key, [...(blocks.get(key) ?? []), array]);
  }
  for (const arrays of blocks.values()) yield* blockChunks(arrays, result.arrays);
}

function* blockChunks(arrays: ResultArrayData[], all: readonly ResultArrayData[]): Generator<string> {
  const [first] = arrays;
  if (first === undefined) return;
  const { dims, place } = placingOf(first, all);
  const coordinates = dims.map((dim) => coordinateOf(dim, all));
  const columns = arrays.filter((array) => !coordinates.includes(array));
  const names = dims.map((dim, i) => (coordinates[i] ? heading(coordinates[i]) : dim));
  yield `\n${[...names, ...columns.map(heading)].map(quote).join(',')}\n`;

  const texts = coordinates.map((coordinate) => coordinate && Array.from(arrayValues(coordinate), numberText));
  const values = columns.map(arrayValues);
  const total = arrayValues(first).length;
  let lines: string[] = [];
  for (let flat = 0; flat < total; flat++) {
    const cells = place(flat).map((index, i) => texts[i]?.[index] ?? String(index));
    for (const column of values) cells.push(numberText(column[flat] ?? 0));
    lines.push(cells.join(','));
    if (lines.length === rowsPerChunk) {
      yield `${lines.join('\n')}\n`;
      lines = [];
    }
  }
  if (lines.length > 0) yield `${lines.join('\n')}\n`;
}

const heading = ({ name, unit }: { name: string; unit: string }) => (unit === '' ? name : `${name} (${unit})`);
const quote = (text: string) => (/[",\n]/.test(text) ? `"${text.replaceAll('"', '""')}"` : text);

/** The array along `dim` alone that is named after it, perhaps with a unit or another word behind: `field`, `fieldT`. */
function coordinateOf(dim: string, all: readonly ResultArrayData[]): ResultArrayData | undefined {
  return all.find(
    ({ name, dims, ragged }) =>
      ragged === undefined &&
      dims.length === 1 &&
      dims[0] === dim &&
      name.startsWith(dim) &&
      /^([A-Z]|$)/.test(name.slice(dim.length)),
  );
}
