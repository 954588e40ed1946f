import type { Certificate, TableColumns } from '@nightcone/kernel';
import type { ArrayIdentity } from '@nightcone/provenance';

/** A job as a thread needs it. */
export interface ThreadJob {
  hash: string;
  /** Digest of the kernel. */
  kernel: string;
  /** Compiled once in this process; a message carries a reference to its code. */
  module: WebAssembly.Module;
  /** Canonical JSON; as text it crosses to the thread at a third of the cost. */
  specification: string;
  tables: ReadonlyMap<string, TableColumns>;
}

/** `whole`: every slice and the assembly. `part`: slices with from ≤ i < to. `assembly`: all payloads in slice order. */
export type ThreadTask = { id: number; job: ThreadJob } & (
  | { kind: 'whole' }
  | { kind: 'part'; from: number; to: number }
  | { kind: 'assembly'; payloads: Uint8Array[] }
);

/** A complete result, its arrays described and digested, their bytes beside them in the same order. */
export interface AssembledResult {
  digest: string;
  arrays: (ArrayIdentity & { ragged?: string; bytes: number })[];
  certificate: Certificate;
  data: Uint8Array[];
}

/** What became of a task. A refusal is the kernel's own, deterministic answer: a result like any other. */
export type Outcome = { id: number; cpuMs: number } & (
  | { status: 'computed'; payloads: Uint8Array[] }
  | { status: 'assembled'; result: AssembledResult }
  | { status: 'refused'; code: string; diagnostic: string }
);

export interface Batch {
  type: 'batch';
  tasks: ThreadTask[];
  /** The memory of a kernel never shrinks: after large jobs its instance is given up. */
  keepsKernel: boolean;
}

export type ThreadReport =
  | { type: 'ready'; cpuSource: 'thread' | 'wall' }
  | { type: 'progress'; id: number; fraction: number }
  | { type: 'outcomes'; outcomes: Outcome[] }
  /** The kernel trapped or found no memory; its instance is gone, the thread goes on. */
  | { type: 'trapped'; message: string }
  | { type: 'end'; yielded: boolean };
