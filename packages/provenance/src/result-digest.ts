import type { KernelResult, ResultArrayData, TableColumns } from '@nightcone/kernel';
import { canonicalJson } from './canonical.ts';
import { sha256Hex } from './sha256.ts';

/** An array as the result digest sees it. */
export interface ArrayIdentity {
  name: string;
  dtype: 'f64' | 'i32' | 'u8';
  shape: number[];
  dims: string[];
  unit: string;
  /** Of the raw little-endian bytes. */
  sha256: string;
}

/** SHA-256 of the raw little-endian bytes of one array. */
export function arrayDigest(array: Pick<ResultArrayData, 'bytes'>): Promise<string> {
  return sha256Hex(array.bytes);
}

/** Name, type, shape, dimensions, unit and digest of every array, in the kernel's order. */
export function arrayIdentities(arrays: readonly ResultArrayData[]): Promise<ArrayIdentity[]> {
  return Promise.all(
    arrays.map(async (array) => {
      const { name, dtype, shape, dims, unit } = array;
      return { name, dtype, shape, dims, unit, sha256: await arrayDigest(array) };
    }),
  );
}

/** SHA-256 of the canonical JSON of `{ arrays, certificate }`: kernel, time, host and threads are outside it. */
export async function resultDigest(result: KernelResult): Promise<string> {
  return resultDigestOf(await arrayIdentities(result.arrays), result.certificate);
}

/** The same from identities that are at hand already. Further members of an identity are left out. */
export function resultDigestOf(
  arrays: readonly ArrayIdentity[],
  certificate: KernelResult['certificate'],
): Promise<string> {
  const identities = arrays.map(({ name, dtype, shape, dims, unit, sha256 }) => ({
    name,
    dtype,
    shape,
    dims,
    unit,
    sha256,
  }));
  return sha256Hex(canonicalJson({ arrays: identities, certificate }));
}

/**
 * Digest of a table (`nightcone.table/1`): canonical JSON of `{ columns: [{ role, unit, count }] }`, a line feed, then
 * the columns one after the other as little-endian doubles. `-0` counts as 0.
 */
export function tableDigest(table: TableColumns): Promise<string> {
  const header = canonicalJson({
    columns: table.columns.map(({ role, unit, values }) => ({ role, unit, count: values.length })),
  });
  const head = new TextEncoder().encode(`${header}\n`);
  const length = table.columns.reduce((sum, { values }) => sum + values.length, 0);
  const bytes = new Uint8Array(head.length + 8 * length);
  bytes.set(head);
  const view = new DataView(bytes.buffer);
  let offset = head.length;
  for (const { values } of table.columns)
    for (const value of values) {
      view.setFloat64(offset, value === 0 ? 0 : value, true);
      offset += 8;
    }
  return sha256Hex(bytes);
}
