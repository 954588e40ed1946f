import type { Task } from '@nightcone/db/queue';
import type { Specification } from '@nightcone/models';
import type { KernelStore } from './features/kernels/kernel-store.ts';
import type { TableStore } from './features/tables/table-store.ts';
import type { ThreadJob } from './threads/messages.ts';

/** Makes a task ready for a thread: its kernel is loaded and its tables are at hand. */
export function jobInputs(kernels: KernelStore, tables: TableStore): (task: Task) => Promise<ThreadJob> {
  return async ({ jobHash, kernelDigest, specification }) => {
    // Safe: the text was checked when it was stored under its hash.
    const { tables: digests } = JSON.parse(specification) as Specification;
    const [{ module }, columns] = await Promise.all([kernels.load(kernelDigest), tables.load(digests)]);
    return { hash: jobHash, kernel: kernelDigest, module, specification, tables: columns };
  };
}
