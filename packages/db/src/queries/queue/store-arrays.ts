import type { Pool } from 'pg';
import type { Chunk, FinishedResult } from '../../queue-types.ts';
import { type Piece, packPieces, rowBytes, splitRows } from './pieces.ts';

interface ArrayRow extends Piece {
  sha256: string;
  bytes: number;
  number: number;
}

/**
 * Stores the bytes of arrays under their SHA-256, before and apart from the record that refers to them: they may be
 * hundreds of megabytes, and the same bytes are the same rows whoever writes them. An attempt that has lost its lease
 * stores nothing. Rows in order of their address, so that two writers of the same arrays never wait for each other in a ring.
 */
export async function storeArrays(pool: Pool, chunk: Chunk, results: readonly FinishedResult[]): Promise<void> {
  const bySha = new Map<string, Uint8Array>();
  for (const { arrays, data } of results) {
    arrays.forEach(({ sha256 }, i) => {
      bySha.set(sha256, data[i] as Uint8Array);
    });
  }
  const rows = [...bySha]
    .sort(([a], [b]) => (a < b ? -1 : 1))
    .flatMap(([sha256, bytes]) =>
      splitRows(bytes).map((data, number): ArrayRow => ({ sha256, bytes: bytes.byteLength, number, data })),
    );
  for (const batch of packPieces(rows, 2 * rowBytes, 5_000)) {
    await pool.query(
      `with fence as (select 1 from leases where chunk_id = $1 and attempt = $2),
       given as (
         select sha256, number, size, substring($7::bytea from at + 1 for length) as data
           from unnest($3::text[], $4::int[], $5::bigint[], $6::int[], $8::int[]) as t(sha256, number, size, at, length)
          where exists (select from fence)),
       stored as (
         insert into result_arrays (sha256, bytes) select distinct sha256, size from given order by sha256
         on conflict do nothing)
       insert into result_array_rows (sha256, number, data) select sha256, number, data from given order by sha256, number
       on conflict do nothing`,
      [
        chunk.id,
        chunk.attempt,
        batch.pieces.map(({ sha256 }) => sha256),
        batch.pieces.map(({ number }) => number),
        batch.pieces.map(({ bytes }) => bytes),
        batch.offsets,
        batch.bytes,
        batch.pieces.map(({ data }) => data.byteLength),
      ],
    );
  }
}
