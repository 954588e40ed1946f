import type { ClientBase } from 'pg';

export interface SlotOffer {
  /** This slot takes only parts estimated at 10 s or less, in turn order, whatever their mark. */
  express: boolean;
  /** Memory that this slot may use, in bytes. */
  memoryBytes: number;
}

/** Cuts the next chunk by turn order, caps, quota and night window; its id, or null. Needs a transaction. */
export async function cutChunk(client: ClientBase, offer: SlotOffer): Promise<string | null> {
  const { rows } = await client.query<{ id: string | null }>('select queue.cut($1, $2) as id', [
    offer.express,
    Math.floor(offer.memoryBytes),
  ]);
  return rows[0]?.id ?? null;
}
