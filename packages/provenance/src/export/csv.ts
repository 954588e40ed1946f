import type { ResultArrayData } from '@nightcone/kernel';
import { arrayValues, indexOf } from '../array-values.ts';
import { numberText } from './number-text.ts';
import type { ResultRecord } from './result-record.ts';

const rowsPerChunk = 2048;

/**
 * The result as comma-separated text in pieces: lines that begin with `#` say what follows; then one block per array
 * with a header line, the index along every dimension, the coordinate where the result holds one (`fieldT` for the
 * dimension `field`), and the value. Blocks are parted by an empty line; numbers have 17 significant digits.
 */
export function* csvChunks(record: ResultRecord): Generator<string> {
  const { specification, jobHash, resultDigest, result } = record;
  yield `# model ${specification.model}\n# job ${jobHash}\n# result ${resultDigest}\n# kernel ${specification.kernel}\n`;
  for (const array of result.arrays) yield* arrayRows(array, result.arrays);
}

function* arrayRows(array: ResultArrayData, all: readonly ResultArrayData[]): Generator<string> {
  const { name, unit, dims, shape, ragged } = array;
  const offsets = ragged === undefined ? undefined : all.find((other) => other.name === ragged);
  const starts = offsets && arrayValues(offsets);
  const coordinates = dims.map((dim) => coordinateOf(dim, array, all));
  const columns = dims.flatMap((dim, i) => [dim, ...(coordinates[i] ? [heading(coordinates[i])] : [])]);
  yield `\n# ${name}${unit === '' ? '' : ` in ${unit}`}${ragged === undefined ? '' : `, rows of ${ragged}`}\n`;
  yield `${[...(starts ? ['row'] : []), ...columns, heading(array)].map(quote).join(',')}\n`;
  const values = arrayValues(array);
  const coordinateValues = coordinates.map((coordinate) => coordinate && arrayValues(coordinate));
  let row = 0;
  let lines: string[] = [];
  for (const [flat, value] of values.entries()) {
    const cells: string[] = [];
    if (starts) {
      while ((starts[row + 1] ?? values.length + 1) <= (indexOf(flat, shape)[0] ?? 0)) row += 1;
      cells.push(String(row));
    }
    for (const [i, place] of indexOf(flat, shape).entries()) {
      cells.push(String(place));
      const coordinate = coordinateValues[i];
      if (coordinate) cells.push(numberText(coordinate[place] ?? 0));
    }
    lines.push(`${[...cells, numberText(value)].join(',')}\n`);
    if (lines.length === rowsPerChunk) {
      yield lines.join('');
      lines = [];
    }
  }
  yield lines.join('');
}

const heading = ({ name, unit }: { name: string; unit: string }) => (unit === '' ? name : `${name} (${unit})`);
const quote = (text: string) => (/[",\n]/.test(text) ? `"${text.replaceAll('"', '""')}"` : text);

/** The f64 array along `dim` alone whose name is the dimension with a unit behind it. */
function coordinateOf(
  dim: string,
  array: ResultArrayData,
  all: readonly ResultArrayData[],
): ResultArrayData | undefined {
  return all.find(
    (other) =>
      other !== array &&
      other.dtype === 'f64' &&
      other.dims.length === 1 &&
      other.dims[0] === dim &&
      other.name.startsWith(dim) &&
      /^[A-Z]/.test(other.name.slice(dim.length)),
  );
}
