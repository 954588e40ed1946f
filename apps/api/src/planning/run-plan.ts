import { limits } from '@nightcone/contracts';
import { NoteCollector } from '@nightcone/models';
import type { FieldError } from '../refusal.ts';
import { Refusal } from '../refusal.ts';
import type { PlanSummary } from './messages.ts';
import { openQuestion, type PlannedPoint, type Question } from './plan-question.ts';
import { probeIndices } from './probe-indices.ts';
import { type LoadedKernel, probeKernel } from './probe-kernel.ts';

export interface PlanControl {
  stopped: boolean;
  /** Resolves when the batch has been dealt with on the other side. */
  sendBatch(points: PlannedPoint[]): Promise<void>;
  release(): void;
}

const batchPoints = 500;
/** Wrong points named in one answer; more would not be read. */
const namedErrors = 20;

/** Plans a question batch by batch. Undefined when it was stopped. Throws Refusal for what cannot be asked. */
export async function runPlan(
  kernel: LoadedKernel,
  asked: Question,
  full: boolean,
  control: PlanControl,
): Promise<PlanSummary | undefined> {
  const question = openQuestion(kernel.manifest, kernel.digest, asked);
  const probes = new Set(probeIndices(question.axes.map(({ values }) => values.length)));
  const notes = new NoteCollector();
  const errors: FieldError[] = [];
  let wrongPoints = 0;
  let first: PlanSummary['first'] | undefined;

  for (let from = 0; from < question.count; from += batchPoints) {
    const points: PlannedPoint[] = [];
    for (let index = from; index < Math.min(from + batchPoints, question.count); index++) {
      const made = question.specification(index);
      if (!made.ok) {
        wrongPoints += 1;
        if (errors.length < namedErrors) errors.push(...made.errors);
        continue;
      }
      const point = question.point(index, made.value);
      const tooLarge = sizeError(point);
      if (tooLarge) {
        wrongPoints += 1;
        if (errors.length < namedErrors) errors.push(tooLarge);
        continue;
      }
      const found = question.notes(made.value);
      notes.add(index, found);
      // What a note refuses is said by the note, in words about the model.
      const refused = found.some(({ severity }) => severity === 'refuse');
      if (probes.has(index) && !refused) probeKernel(kernel, made.value, point);
      first ??= { hash: point.hash, canonicalText: point.canonicalText ?? '' };
      points.push(
        full
          ? { ...point, questionDigest: question.questionDigest(made.value) }
          : { ...point, canonicalText: undefined },
      );
    }
    if (wrongPoints === 0) await control.sendBatch(points);
    if (control.stopped) return undefined;
  }
  if (wrongPoints > 0 || !first) {
    const what = question.count === 1 ? 'The specification' : `${wrongPoints} of ${question.count} points`;
    const detail = `${what} cannot be computed: ${errors[0]?.message}`;
    throw new Refusal('invalid-specification', detail, { errors, figures: { points: wrongPoints } });
  }
  return { count: question.count, base: question.base, axes: question.axes, notes: notes.summary(), first };
}

function sizeError({ index, resultBytes, memoryBytes }: PlannedPoint): FieldError | undefined {
  const error = (what: string, value: number, limit: number): FieldError => ({
    field: '/specification',
    message: `Point ${index} needs ${megabytes(value)} of ${what}; at most ${megabytes(limit)} are possible.`,
    value,
    limit: String(limit),
  });
  if (resultBytes > limits.resultBytes) return error('result', resultBytes, limits.resultBytes);
  if (memoryBytes > limits.kernelBytes) return error('memory', memoryBytes, limits.kernelBytes);
  return undefined;
}

const megabytes = (bytes: number) => `${Math.round(bytes / 1e6).toLocaleString('en')} MB`;
