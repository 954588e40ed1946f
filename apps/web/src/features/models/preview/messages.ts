import type { Certificate, ResultArrayData } from '@nightcone/kernel';
import type { SpecificationBody } from '@nightcone/models';

/** What the page and the kernel's worker say to each other. */
export interface RunRequest {
  id: number;
  /** Digest of the kernel and where its module is. */
  digest: string;
  moduleUrl: string;
  specification: SpecificationBody & { model: string };
}

export type RunAnswer =
  | { id: number; type: 'taken' }
  | { id: number; type: 'done'; arrays: ResultArrayData[]; certificate: Certificate; ms: number }
  /** The kernel refused the question: deterministic, in words. */
  | { id: number; type: 'refused'; status: string; message: string }
  /** The machine failed or the module did not arrive. */
  | { id: number; type: 'failed'; message: string };
