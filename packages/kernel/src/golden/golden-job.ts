import type { Json } from '@nightcone/models';
import type { Tables } from '../types.ts';

/**
 * A job whose result digest is committed: one for every option that changes which code runs. A released golden job
 * never changes; new ones are added.
 */
export interface GoldenJob {
  name: string;
  model: string;
  parameters: { [name: string]: Json };
  numerics: { [name: string]: Json };
  /** Columns of the tables it refers to, by digest. */
  tables?: { [digest: string]: { role: string; unit: string; values: number[] }[] };
}

/** The job's tables as the kernel takes them. */
export function goldenTables(job: Pick<GoldenJob, 'tables'>): Tables {
  return new Map(
    Object.entries(job.tables ?? {}).map(([digest, columns]) => [
      digest,
      { columns: columns.map(({ role, unit, values }) => ({ role, unit, values: new Float64Array(values) })) },
    ]),
  );
}
