import { createHash, randomBytes } from 'node:crypto';
import { sql } from 'drizzle-orm';
import { afterAll, beforeAll, expect, test } from 'vitest';
import {
  createAccount,
  createKernel,
  createTestDatabase,
  resultOf,
  startQueue,
  submitTestSweep,
  type TestDatabase,
  takeChunk,
  workOff,
} from '../../../testing/index.ts';
import type { Queue } from '../../queue.ts';
import { packPieces, rowBytes, splitRows } from './pieces.ts';

let database: TestDatabase;
let kernel: string;
let queue: Queue;
beforeAll(async () => {
  database = await createTestDatabase();
  kernel = await createKernel(database.db);
  queue = await startQueue(database.url);
});
afterAll(async () => {
  await queue.stop();
  await database.drop();
});

const sha256 = (bytes: Uint8Array) => createHash('sha256').update(bytes).digest('hex');
const large = randomBytes(2 * rowBytes + 12_345);

test('an array comes back byte for byte, in rows of at most 4 MiB; an empty one is there too', async () => {
  await submitTestSweep(database.db, await createAccount(database.db), { kernel, numbers: [1] });
  const chunk = await takeChunk(queue);
  const data = [large, Buffer.alloc(0)];
  const [shape] = resultOf('').arrays;
  if (!shape) throw new Error('the fixture has an array');
  const arrays = data.map((bytes, i) => ({ ...shape, name: `a${i}`, sha256: sha256(bytes), bytes: bytes.length }));
  const result = { ...resultOf('large'), arrays, data };
  await queue.record(chunk, [{ index: 0, cpuUs: 1, outcome: 'result', result }]);
  await queue.finish(chunk);
  for (const bytes of data) {
    const { rows } = await database.db.execute<{ data: Buffer; number: number }>(
      sql`select number, data from result_array_rows where sha256 = ${sha256(bytes)} order by number`,
    );
    expect(rows.map(({ number }) => number)).toEqual(splitRows(bytes).map((_, number) => number));
    expect(Buffer.concat(rows.map((row) => row.data)).equals(bytes)).toBe(true);
  }
});

test('payloads of several rows come back for the assembly byte for byte', async () => {
  const job = { estimatedMs: 4000, slices: 3 };
  await submitTestSweep(database.db, await createAccount(database.db), { kernel, numbers: [2], job });
  for (let parts = 0; parts < 2; ) {
    const chunk = await takeChunk(queue);
    await queue.record(
      chunk,
      chunk.tasks.map(({ index, sliceFrom, sliceTo }) => ({
        index,
        cpuUs: 1,
        outcome: 'payloads',
        payloads: Array.from({ length: sliceTo - sliceFrom }, (_, i) => large.subarray(sliceFrom + i)),
      })),
    );
    await queue.finish(chunk);
    parts += chunk.tasks.length;
  }
  const assembly = await takeChunk(queue);
  const [task] = assembly.tasks;
  if (task?.kind !== 'assembly') throw new Error('an assembly was due');
  const payloads = await queue.payloads(assembly, task);
  expect(payloads.map((bytes, slice) => large.subarray(slice).equals(bytes))).toEqual([true, true, true]);
  await workOff(queue, assembly);
});

test('pieces are packed up to a size and a number, and none is lost or moved', () => {
  const pieces = [5, 5, 1, 12, 0, 3].map((length, i) => ({ data: Buffer.alloc(length, i) }));
  const batches = [...packPieces(pieces, 10, 2)];
  expect(batches.map((batch) => batch.pieces.length)).toEqual([2, 1, 1, 2]);
  expect(batches.flatMap((batch) => batch.pieces)).toEqual(pieces);
  for (const { pieces: packed, offsets, bytes } of batches) {
    packed.forEach(({ data }, i) => {
      const at = offsets[i] as number;
      expect(bytes.subarray(at, at + data.length).equals(data)).toBe(true);
    });
  }
});
