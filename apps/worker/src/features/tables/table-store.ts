import type { TableColumns, Tables } from '@nightcone/kernel';
import { RecentMap } from '../../recent-map.ts';

export interface StoredTable {
  columns: { role: string; unit: string; count: number }[];
  /** The columns one after the other as little-endian doubles. */
  bytes: Uint8Array;
}

const none: Tables = new Map();

/** Uploaded tables of this process by digest, the last few kept. */
export class TableStore {
  readonly #tables = new RecentMap<string, TableColumns>(32);

  constructor(private readonly fetchTable: (digest: string) => Promise<StoredTable | undefined>) {}

  async load(digests: readonly string[]): Promise<Tables> {
    if (digests.length === 0) return none;
    return new Map(await Promise.all(digests.map(async (digest) => [digest, await this.#load(digest)] as const)));
  }

  async #load(digest: string): Promise<TableColumns> {
    const atHand = this.#tables.get(digest);
    if (atHand) return atHand;
    const stored = await this.fetchTable(digest);
    if (!stored) throw new Error(`table ${digest} is not stored in this database`);
    const table = readColumns(stored);
    this.#tables.set(digest, table);
    return table;
  }
}

export function readColumns({ columns, bytes }: StoredTable): TableColumns {
  const view = new DataView(bytes.buffer, bytes.byteOffset, bytes.byteLength);
  let at = 0;
  return {
    columns: columns.map(({ role, unit, count }) => {
      const start = at;
      at += 8 * count;
      return {
        role,
        unit,
        values: Float64Array.from({ length: count }, (_, i) => view.getFloat64(start + 8 * i, true)),
      };
    }),
  };
}
