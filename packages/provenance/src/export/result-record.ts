import type { KernelResult, Specification } from '@nightcone/kernel';

/** A validity note as files carry it. */
export interface RecordedNote {
  code: string;
  severity: 'note' | 'caution' | 'refuse';
  field: string;
  value: number;
  limit: number;
  unit: string;
  text: string;
}

/** A result with everything that is needed to read it and to reproduce it. */
export interface ResultRecord {
  specification: Specification;
  jobHash: string;
  resultDigest: string;
  result: KernelResult;
  notes: RecordedNote[];
}
