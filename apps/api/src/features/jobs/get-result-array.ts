import type { endpoints } from '@nightcone/contracts';
import { findOptionalResult, readArrayRows } from '@nightcone/db';
import { npyHeader } from '@nightcone/provenance';
import type { Handler } from '../../context.ts';
import { notFound, Refusal } from '../../refusal.ts';

/** One array as it was computed, row by row from the database at the reader's pace. */
export const getResultArray: Handler<typeof endpoints.getResultArray> = async ({ ctx, input }) => {
  const { db } = ctx.services;
  const { digest, name } = input.params;
  const result = await findOptionalResult(db, digest, ctx.caller.account.id);
  const array = result?.arrays.find((candidate) => candidate.name === name);
  if (!result || !array) throw notFound('array');
  if (result.state === 'evicted')
    throw new Refusal(
      'result-evicted',
      'The arrays of this result are not kept; a re-run of its job brings them back.',
    );
  const head = input.query.format === 'npy' ? npyHeader(array) : new Uint8Array();
  return {
    type: 'application/octet-stream',
    bytes: head.length + array.bytes,
    fileName: input.query.format === 'npy' ? `${name}.npy` : undefined,
    etag: `${array.sha256}-${input.query.format}`,
    // The address holds the digest: the bytes under it never change.
    cache: 'private, max-age=31536000, immutable',
    chunks: withHead(head, readArrayRows(db, array.sha256)),
  };
};

async function* withHead(head: Uint8Array, rows: AsyncIterable<Uint8Array>): AsyncGenerator<Uint8Array> {
  if (head.length > 0) yield head;
  yield* rows;
}
