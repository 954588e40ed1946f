import type { ResultArrayData } from '@nightcone/kernel';
import { type ArrayValues, arrayValues } from '../array-values.ts';
import { numberText } from './number-text.ts';
import type { ResultRecord } from './result-record.ts';

const rowsPerChunk = 1024;

/**
 * The result as comma-separated text in pieces. Lines that begin with `#` name job, result and kernel. Then one block
 * for all arrays along the same dimensions: a header line, one column per dimension (the coordinate where the result
 * holds one, `fieldT` for the dimension `field`, else the index from 0), one per array. Ragged lists have the row they
 * belong to in front. Blocks are parted by an empty line; numbers have 17 significant digits.
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
  const [{ dims, shape, ragged } = { dims: [], shape: [], ragged: undefined }] = arrays;
  const offsets = all.find(({ name }) => name === ragged);
  const coordinates = dims.map((dim) => coordinateOf(dim, all));
  const columns = arrays.filter((array) => !coordinates.includes(array));
  const names = dims.map((dim, i) => (coordinates[i] ? heading(coordinates[i]) : dim));
  yield `\n${[...(offsets ? [`row of ${ragged}`] : []), ...names, ...columns.map(heading)].map(quote).join(',')}\n`;

  const rowOf = offsets && rowFinder(arrayValues(offsets));
  const places = dims.map((_, i) => placeTexts(shape[i] ?? 0, coordinates[i]));
  const values = columns.map(arrayValues);
  const index = dims.map(() => 0);
  const total = shape.reduce((a, b) => a * b, 1);
  let lines: string[] = [];
  for (let flat = 0; flat < total; flat++) {
    const cells = index.map((place, i) => places[i]?.[place] ?? '');
    if (rowOf) cells.unshift(String(rowOf(index[0] ?? 0)));
    for (const column of values) cells.push(numberText(column[flat] ?? 0));
    lines.push(cells.join(','));
    advance(index, shape);
    if (lines.length === rowsPerChunk) {
      yield `${lines.join('\n')}\n`;
      lines = [];
    }
  }
  if (lines.length > 0) yield `${lines.join('\n')}\n`;
}

/** The next index in row-major order. */
function advance(index: number[], shape: readonly number[]): void {
  for (let i = index.length - 1; i >= 0; i--) {
    const next = (index[i] ?? 0) + 1;
    index[i] = next < (shape[i] ?? 0) ? next : 0;
    if (index[i] !== 0) return;
  }
}

/** The row of a ragged list that holds an entry; to be asked in ascending order. */
function rowFinder(offsets: ArrayValues): (entry: number) => number {
  let row = 0;
  return (entry) => {
    while (row + 2 < offsets.length && (offsets[row + 1] ?? 0) <= entry) row += 1;
    return row;
  };
}

function placeTexts(count: number, coordinate: ResultArrayData | undefined): string[] {
  const values = coordinate && arrayValues(coordinate);
  return Array.from({ length: count }, (_, i) => (values ? numberText(values[i] ?? 0) : String(i)));
}

const heading = ({ name, unit }: { name: string; unit: string }) => (unit === '' ? name : `${name} (${unit})`);
const quote = (text: string) => (/[",\n]/.test(text) ? `"${text.replaceAll('"', '""')}"` : text);

/** The array along `dim` alone whose name is the dimension with a unit or another word behind it. */
function coordinateOf(dim: string, all: readonly ResultArrayData[]): ResultArrayData | undefined {
  return all.find(
    ({ name, dims, ragged }) =>
      ragged === undefined &&
      dims.length === 1 &&
      dims[0] === dim &&
      name.startsWith(dim) &&
      /^[A-Z]/.test(name.slice(dim.length)),
  );
}
