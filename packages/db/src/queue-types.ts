/** One part of a chunk: a block of slices of one job, or the assembly of a job whose other parts are recorded. */
export interface Task {
  /** Number of the part in its submission; `record` names parts by it. */
  index: number;
  /** Number of the job in its submission. */
  point: number;
  jobHash: string;
  executionId: string;
  /** Canonical JSON of the specification: parse it, give it to the kernel. */
  specification: string;
  kernelDigest: string;
  /** Slices `sliceFrom` to `sliceTo` (excluded) are this part's; empty for an assembly. */
  sliceFrom: number;
  sliceTo: number;
  /** Slices of the whole job. */
  slices: number;
  /**
   * `whole`: compute all slices, assemble at once, record a result.
   * `part`: compute the slices, record their payloads.
   * `assembly`: fetch the recorded payloads with `Queue.payloads(chunk, task)`, assemble, record a result.
   */
  kind: 'whole' | 'part' | 'assembly';
}

/** Work for one slot. Every write names (id, attempt): a worker that has lost its lease writes nothing. */
export interface Chunk {
  id: string;
  /** 1 for the first attempt; the fencing token together with `id`. */
  attempt: number;
  submissionId: string;
  /** Reference CPU milliseconds after which the slot stops at the next end of a task and finishes the chunk. */
  budgetMs: number;
  /** Peak memory of one of its tasks. */
  memoryBytes: number;
  /** In the order to be computed. Never empty. */
  tasks: Task[];
}

/** What a worker does next with a chunk; the answer to every write. `yield`: stop at the next end of a task and finish. */
export type Order = 'go' | 'yield' | 'cancel' | 'lost';

export interface ArrayDescription {
  name: string;
  dtype: 'f64' | 'i32' | 'u8';
  shape: number[];
  dims: string[];
  unit: string;
  ragged?: string;
  /** SHA-256 of the raw bytes. */
  sha256: string;
  bytes: number;
}

export interface FinishedResult {
  /** Result digest, made by the worker with the provenance package. */
  digest: string;
  arrays: ArrayDescription[];
  certificate: {
    numbers: Record<string, number>;
    checks: { code: string; computed: number; expected: number; tolerance: number; holds: boolean }[];
  };
  /** Raw little-endian bytes of each array, in the order of `arrays`. */
  data: Uint8Array[];
}

/** How one task ended; `cpuUs` is measured CPU in whole microseconds (not multiplied by the speed factor). */
export type PartRecord = { index: number; cpuUs: number } & (
  | { outcome: 'payloads'; payloads: Uint8Array[] }
  | { outcome: 'result'; result: FinishedResult }
  /** Deterministic: the kernel's status, e.g. `not-converged`. The job has failed and is never tried again. */
  | { outcome: 'failure'; code: string; text: string }
);

export interface Heartbeat {
  chunk: Chunk;
  /** Measured CPU microseconds of the chunk so far. */
  cpuUs: number;
  /** 0 to 1. */
  fraction: number;
}

export interface WorkerDescription {
  id: string;
  host: string;
  pid: number;
  slots: number;
  memoryBytes: number;
  speedFactor: number;
}
