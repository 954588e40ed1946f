import type { KernelResult, ResultArrayData, Specification } from '@nightcone/kernel';
import { bytesPerValue } from '../array-values.ts';
import type { ResultRecord } from './result-record.ts';

type JsonArray = Omit<ResultArrayData, 'bytes'> & { values: number[] };

/** Reads the JSON form of a result back, to the same bytes. Throws SyntaxError where it is none of ours. */
export function readResultJson(text: string): ResultRecord {
  const file = JSON.parse(text) as {
    specification?: Specification;
    jobHash?: string;
    resultDigest?: string;
    arrays?: JsonArray[];
    certificate?: KernelResult['certificate'];
    notes?: ResultRecord['notes'];
  };
  const { specification, jobHash, resultDigest, arrays, certificate, notes = [] } = file;
  if (!specification || !jobHash || !resultDigest || !Array.isArray(arrays) || !certificate)
    throw new SyntaxError('the file lacks specification, jobHash, resultDigest, arrays or certificate');
  return {
    specification,
    jobHash,
    resultDigest,
    notes,
    result: { arrays: arrays.map(readArray), certificate },
  };
}

function readArray({ name, dtype, shape, dims, unit, ragged, values }: JsonArray): ResultArrayData {
  const size = bytesPerValue[dtype];
  if (size === undefined || !Array.isArray(values) || values.length !== shape.reduce((a, b) => a * b, 1))
    throw new SyntaxError(`the array ${name} does not hold what its shape says`);
  const bytes = new Uint8Array(size * values.length);
  const view = new DataView(bytes.buffer);
  for (const [i, value] of values.entries()) {
    if (dtype === 'f64') view.setFloat64(8 * i, value, true);
    else if (dtype === 'i32') view.setInt32(4 * i, value, true);
    else view.setUint8(i, value);
  }
  return { name, dtype, shape, dims, unit, ...(ragged === undefined ? {} : { ragged }), bytes };
}
