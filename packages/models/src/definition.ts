import type { Expression } from './expression.ts';
import type { Field, Json } from './fields.ts';

/** One named array of a result. A `ragged` array is stored as values beside an i32 offsets array of that name. */
export interface ResultArray {
  name: string;
  dtype: 'f64' | 'i32' | 'u8';
  dims: string[];
  unit: string;
  ragged?: string;
  display?: { title: string; symbol?: string; help?: string };
}

/** One check of the certificate. `code` is a manifest index in the kernel and a name everywhere else. */
export interface CheckDefinition {
  code: string;
  unit: string;
  display?: { title: string; source: string };
}

/** A validity note: words chosen by code, numbers made with + − × ÷ √ only, so browser and server agree. */
export interface ValidityNote {
  code: string;
  severity: 'note' | 'caution' | 'refuse';
  /** JSON Pointer of the field beside which the note stands. */
  field: string;
  value: number;
  limit: number;
  unit: string;
}

/** Collects the notes of one specification. */
export type AddNote = (
  code: string,
  severity: ValidityNote['severity'],
  field: string,
  value: number,
  limit: number,
  unit: string,
) => void;

export interface Specification {
  schema: 'nightcone.job/1';
  model: string;
  parameters: { [name: string]: Json };
  numerics: { [name: string]: Json };
  /** Sorted distinct digests of the tables that the specification refers to. */
  tables: string[];
  /** SHA-256 of the kernel's bytes. */
  kernel: string;
}

/** A sweep axis: values are already decimal-exact JSON values. Several pointers in one axis vary together (zipped). */
export interface SweepAxis {
  pointers: string[];
  /** values[i] holds one value per pointer. */
  values: Json[][];
}

export interface WorkedExample {
  id: string;
  title: string;
  /** The question in a theorist's words. */
  question: string;
  source: string;
  parameters: { [name: string]: Json };
  numerics?: { [name: string]: Json };
  sweep?: SweepAxis[];
}

/** One reduction of the live preview; applied in order until the cost fits. Reduced copies are never hashed. */
export type PreviewReduction =
  | { pointer: string; axisCount: number }
  | { pointer: string; nearestCount: number }
  | { pointer: string; singleGridCells: number }
  | { pointer: string; integer: number };

export interface ModelDefinition {
  id: string;
  title: string;
  /** The question this model answers, as the picker shows it. */
  question: string;
  /** One sentence under the title. */
  summary: string;
  parameters: Field[];
  numerics: Field[];
  results: ResultArray[];
  /** Certificate numbers before the checks, in the kernel's order. */
  certificate: { name: string; unit: string }[];
  checks: CheckDefinition[];
  sliceCount: Expression;
  /** Floating-point operations of the whole job, calibrated against measured slices. */
  cost: Expression;
  assembleCost: Expression;
  /** Peak bytes of one slice, and of `assemble` (payloads + result). */
  sliceBytes: Expression;
  assembleBytes: Expression;
  resultBytes: Expression;
  /** Validity of a complete specification. Pure, + − × ÷ √ only. */
  notes(body: { parameters: { [name: string]: Json }; numerics: { [name: string]: Json } }): ValidityNote[];
  /** Sentences by note code; {value} and {limit} are replaced by formatted quantities. */
  noteTexts: { [code: string]: string };
  preview: PreviewReduction[];
  examples: WorkedExample[];
  /** Prose of the methods page; formulas in TeX between $…$ (inline) and $$…$$ (display). */
  methods: { equations: string; numerics: string; validity: string; sources: string[]; pitfalls: string[] };
}

/** What the kernel carries of a model in its custom section: no titles, symbols or help. */
export type ModelManifest = Pick<
  ModelDefinition,
  'id' | 'sliceCount' | 'cost' | 'assembleCost' | 'sliceBytes' | 'assembleBytes' | 'resultBytes' | 'certificate'
> & {
  parameters: Field[];
  numerics: Field[];
  results: Omit<ResultArray, 'display'>[];
  checks: Omit<CheckDefinition, 'display'>[];
};

export interface KernelManifest {
  interface: 1;
  /** Kernel version, e.g. "0.1.0". */
  version: string;
  models: ModelManifest[];
}
