/** Bytes of one stored row at most. */
export const rowBytes = 4_194_304;

export interface Piece {
  data: Uint8Array;
}

/** Bytes in rows of at most 4 MiB; empty bytes are one empty row, so that 'stored' and 'missing' differ. */
export function splitRows(bytes: Uint8Array): Uint8Array[] {
  const rows: Uint8Array[] = [];
  for (let at = 0; at < bytes.byteLength; at += rowBytes) rows.push(bytes.subarray(at, at + rowBytes));
  return rows.length > 0 ? rows : [bytes];
}

/**
 * Many pieces as few statements: their bytes in one buffer, which the driver sends in binary (an array of byte strings
 * would be sent as hexadecimal text, twice as long), cut apart again by the server.
 */
export function* packPieces<T extends Piece>(
  pieces: readonly T[],
  maxBytes: number,
  maxPieces: number,
): Generator<{ pieces: T[]; offsets: number[]; bytes: Buffer }> {
  let batch: T[] = [];
  let size = 0;
  const pack = () => {
    const offsets: number[] = [];
    let at = 0;
    for (const { data } of batch) {
      offsets.push(at);
      at += data.byteLength;
    }
    const packed = { pieces: batch, offsets, bytes: Buffer.concat(batch.map(({ data }) => data)) };
    batch = [];
    size = 0;
    return packed;
  };
  for (const piece of pieces) {
    if (batch.length > 0 && (size + piece.data.byteLength > maxBytes || batch.length >= maxPieces)) yield pack();
    batch.push(piece);
    size += piece.data.byteLength;
  }
  if (batch.length > 0) yield pack();
}
