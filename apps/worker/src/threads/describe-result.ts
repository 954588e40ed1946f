import type { KernelResult } from '@nightcone/kernel';
import { arrayIdentities, resultDigestOf } from '@nightcone/provenance';
import type { AssembledResult } from './messages.ts';

/** Digests a result, once per array, and parts its description from its bytes. */
export async function describeResult({ arrays, certificate }: KernelResult): Promise<AssembledResult> {
  const identities = await arrayIdentities(arrays);
  return {
    digest: await resultDigestOf(identities, certificate),
    arrays: identities.map((identity, i) => {
      const ragged = arrays[i]?.ragged;
      return { ...identity, ...(ragged === undefined ? {} : { ragged }), bytes: arrays[i]?.bytes.byteLength ?? 0 };
    }),
    certificate,
    data: arrays.map(({ bytes }) => bytes),
  };
}
