import type { Chunk, SlotOffer } from '@nightcone/db/queue';
import { expect, it } from 'vitest';
import { ChunkSource } from './chunk-source.ts';

const worker = { id: 'w', host: 'h', pid: 1, slots: 2, memoryBytes: 100, speedFactor: 1 };
const chunkOf = (memoryBytes: number): Chunk => ({
  id: 'c',
  attempt: 1,
  submissionId: 's',
  budgetMs: 1,
  memoryBytes,
  tasks: [],
});

it('offers what the chunks in hand leave, also when slots ask at the same time', async () => {
  const offers: SlotOffer[] = [];
  const chunks = [chunkOf(70), chunkOf(20), null];
  const source = new ChunkSource({
    worker,
    next: async (offer) => {
      offers.push(offer);
      return chunks.shift() ?? null;
    },
  });
  const [first] = await Promise.all([source.next(false), source.next(true), source.next(false)]);
  expect(offers).toEqual([
    { express: false, memoryBytes: 100 },
    { express: true, memoryBytes: 30 },
    { express: false, memoryBytes: 10 },
  ]);
  source.release(first as Chunk);
  await source.next(false);
  expect(offers.at(-1)).toEqual({ express: false, memoryBytes: 80 });
});

it('goes on after a fetch that failed', async () => {
  let fails = true;
  const source = new ChunkSource({
    worker,
    next: async () => {
      if (!fails) return null;
      fails = false;
      throw new Error('refused');
    },
  });
  await expect(source.next(false)).rejects.toThrow('refused');
  expect(await source.next(false)).toBeNull();
});
