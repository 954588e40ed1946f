import type { KernelManifest } from '@nightcone/models';

export type { Field, FieldType, Json, KernelManifest, Specification } from '@nightcone/models';

/** One array of a result, raw little-endian bytes. `ragged` names the i32 array that holds its offsets. */
export interface ResultArrayData {
  name: string;
  dtype: 'f64' | 'i32' | 'u8';
  shape: number[];
  dims: string[];
  unit: string;
  ragged?: string;
  bytes: Uint8Array;
}

export interface Certificate {
  /** By name, in the manifest's order. */
  numbers: Record<string, number>;
  checks: { code: string; computed: number; expected: number; tolerance: number; holds: boolean }[];
}

export interface KernelResult {
  arrays: ResultArrayData[];
  certificate: Certificate;
}

/** Columns of one table, in the units of its roles. */
export interface TableColumns {
  columns: { role: string; unit: string; values: Float64Array }[];
}
export type Tables = ReadonlyMap<string, TableColumns>;

/** A kernel status other than 0: deterministic, never retried. */
export class KernelRefusal extends Error {
  override name = 'KernelRefusal';
  constructor(
    /** e.g. 'invalid-parameter', 'not-converged', 'memory-exceeded', 'outside-table', 'inertia-mismatch'. */
    readonly status: string,
    readonly code: number,
    message: string,
  ) {
    super(message);
  }
}

/** The WebAssembly machine itself failed (trap, no memory): a crash, may be retried. */
export class KernelCrash extends Error {
  override name = 'KernelCrash';
}

/** One instance of a kernel: one module, one memory, one job open at a time. Not shared between threads. */
export interface KernelInstance {
  readonly manifest: KernelManifest;
  /** Encodes the specification by the manifest and opens it. Throws KernelRefusal. */
  open(specification: { model: string; parameters: object; numerics: object }, tables?: Tables): void;
  sliceCount(): number;
  /** Estimated floating-point operations of slice i. */
  sliceCost(i: number): number;
  assembleCost(): number;
  /** Payload of slice i: a copy, the same bytes in any order and on any machine. */
  computeSlice(i: number): Uint8Array;
  /** All payloads in slice order. */
  assemble(payloads: readonly Uint8Array[]): KernelResult;
  close(): void;
}
