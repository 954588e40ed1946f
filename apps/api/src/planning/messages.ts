import type { ProblemCode } from '@nightcone/contracts';
import type { KernelManifest, NoteOfPoints, Specification, SweepAxis } from '@nightcone/models';
import type { Refusal } from '../refusal.ts';
import type { PlannedPoint, Question } from './plan-question.ts';

/** What the planning thread is told. */
export type ToThread =
  | { type: 'kernel'; digest: string; manifest: KernelManifest; bytes: Uint8Array }
  | { type: 'plan'; id: number; kernel: string; question: Question; full: boolean }
  /** A batch has been dealt with; the next one may come. */
  | { type: 'next'; id: number }
  | { type: 'stop'; id: number };

/** The whole question after its points. */
export interface PlanSummary {
  count: number;
  base: Specification;
  axes: SweepAxis[];
  notes: NoteOfPoints[];
  first: { hash: string; canonicalText: string };
}

/** What it answers. Each plan sends its batches, then one `done` or `refused` or `broken`. */
export type FromThread =
  | { type: 'batch'; id: number; points: PlannedPoint[] }
  | { type: 'done'; id: number; summary: PlanSummary }
  | { type: 'refused'; id: number; code: ProblemCode; detail: string; more: Refusal['more'] }
  | { type: 'broken'; id: number; text: string };
