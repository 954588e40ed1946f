import type { ResultArrayData } from '@nightcone/kernel';
import { type ArrayValues, arrayValues } from '../array-values.ts';
import { canonicalJson } from '../canonical.ts';
import { numberText } from './number-text.ts';
import type { ResultRecord } from './result-record.ts';

const valuesPerChunk = 8192;

/**
 * The result as one JSON object, in pieces (a large one is longer than a string may be):
 * `{ jobHash, resultDigest, kernel, specification, arrays: [{ name, dtype, shape, dims, unit, values, offsets? }],
 * certificate, notes }`. Numbers of arrays have 17 significant digits. The shape is stable: scripts depend on it. The same
 * result gives the same bytes, wherever its parts were kept meanwhile.
 */
export function* jsonChunks(record: ResultRecord): Generator<string> {
  const { jobHash, resultDigest, specification, result, notes } = record;
  const head = JSON.stringify({ jobHash, resultDigest, kernel: specification.kernel });
  yield `${head.slice(0, -1)},"specification":${canonicalJson(specification)},"arrays":[`;
  for (const [i, array] of result.arrays.entries()) {
    if (i > 0) yield ',';
    yield* arrayChunks(array, result.arrays);
  }
  yield `],"certificate":${canonicalJson(result.certificate)},"notes":${canonicalJson(notes)}}\n`;
}

function* arrayChunks(array: ResultArrayData, all: readonly ResultArrayData[]): Generator<string> {
  const { name, dtype, shape, dims, unit, ragged } = array;
  yield `\n${JSON.stringify({ name, dtype, shape, dims, unit }).slice(0, -1)},"values":[`;
  yield* numberChunks(arrayValues(array));
  const offsets = ragged === undefined ? undefined : all.find((other) => other.name === ragged);
  if (offsets) {
    yield `],"ragged":${JSON.stringify(ragged)},"offsets":[`;
    yield* numberChunks(arrayValues(offsets));
  }
  yield ']}';
}

function* numberChunks(values: ArrayValues): Generator<string> {
  for (let from = 0; from < values.length; from += valuesPerChunk) {
    const piece = Array.from(values.subarray(from, from + valuesPerChunk), numberText).join(',');
    yield from > 0 ? `,${piece}` : piece;
  }
}

/** The whole text at once, for small results. */
export const jsonText = (record: ResultRecord) => [...jsonChunks(record)].join('');
