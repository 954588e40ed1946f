import { createHash } from 'node:crypto';
import type { SpecificationInput, SweepAxisInput } from '@nightcone/contracts';
import {
  findModel,
  type Json,
  type KernelManifest,
  type ModelManifest,
  parseSpecification,
  planSweep,
  type Specification,
  type SweepAxis,
  sweepAxisProblems,
  sweepValues,
  type ValidityNote,
} from '@nightcone/models';
import { canonicalText, questionText } from '@nightcone/provenance';
import type { FieldError } from '../refusal.ts';
import { Refusal } from '../refusal.ts';
import { expandAxes } from './expand-axes.ts';
import { compileSizes } from './job-sizes.ts';

export interface Question {
  specification: SpecificationInput;
  axes: readonly SweepAxisInput[];
}

/** One job of a question. `index` is the place in the grid: row-major over the axes, last axis fastest. */
export interface PlannedPoint {
  index: number;
  hash: string;
  /** The swept values, one per pointer. */
  values: Json[];
  /** Reference CPU milliseconds by the formulas of the kernel's manifest. */
  estimatedMs: number;
  slices: number;
  resultBytes: number;
  /** Peak of a slice or of the assembly, whichever is larger. */
  memoryBytes: number;
  tables: string[];
  /** Only in a full plan. */
  canonicalText?: string;
  questionDigest?: string;
}

export interface OpenQuestion {
  count: number;
  base: Specification;
  axes: SweepAxis[];
  /** The complete specification of a point, or what is wrong with it. */
  specification(index: number): { ok: true; value: Specification } | { ok: false; errors: FieldError[] };
  point(index: number, specification: Specification): PlannedPoint;
  questionDigest(specification: Specification): string;
  notes(specification: Specification): ValidityNote[];
}

const sha256 = (text: string) => createHash('sha256').update(text).digest('hex');
const inSpecification = (field: string) => `/specification${field}`;

/** Reads a question against the manifest of its kernel. Nothing is expanded before the number of points is known to fit. */
export function openQuestion(manifest: KernelManifest, kernel: string, question: Question): OpenQuestion {
  const parsed = parseSpecification(manifest, { ...question.specification, kernel });
  if (!parsed.ok) {
    const errors = parsed.problems.map(({ field, ...rest }) => ({ field: inSpecification(field), ...rest }));
    throw new Refusal('invalid-specification', errors[0]?.message ?? 'The specification is not valid.', { errors });
  }
  const base = parsed.specification;
  const model = manifest.models.find(({ id }) => id === base.model) as ModelManifest;
  const axes = expandAxes(model, base, question.axes);
  const wrong = sweepAxisProblems(model, axes);
  if (wrong.length > 0) {
    const errors = wrong.map(({ field, ...rest }) => ({ field: `/axes${field}`, ...rest }));
    throw new Refusal('invalid-specification', errors[0]?.message ?? 'The axes are not valid.', { errors });
  }
  const plan = planSweep(manifest, base, axes);
  const sizes = compileSizes(model);
  const definition = findModel(base.model);

  return {
    count: plan.count,
    base,
    axes,
    specification(index) {
      const made = plan.point(index);
      if (made.ok) return { ok: true, value: made.specification };
      const errors = made.problems.map(({ field, message, value, limit }) => ({
        field: inSpecification(field),
        message: axes.length > 0 ? `Point ${index}: ${message}` : message,
        value,
        limit,
      }));
      return { ok: false, errors };
    },
    point(index, specification) {
      const text = canonicalText(specification);
      return {
        index,
        hash: sha256(text),
        values: sweepValues(axes, index),
        ...sizes(specification),
        tables: specification.tables,
        canonicalText: text,
      };
    },
    questionDigest: (specification) => sha256(questionText(manifest, specification)),
    notes: (specification) => definition?.notes(specification) ?? [],
  };
}
