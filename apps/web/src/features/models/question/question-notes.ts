import type { NoteSummary } from '@nightcone/contracts';
import { type ModelDefinition, noteText, type Specification, validityOf } from '@nightcone/models';
import { controlOf } from './check-form.ts';
import type { FormTexts } from './form-texts.ts';
import type { QuestionNote } from './question-context.ts';

const letters = 'abcdefghijklmnopqrstuvwxyz';

/** Notes of the question: those of every point once the server has looked at all, else those of the previewed one. */
export function questionNotes(
  model: ModelDefinition,
  texts: FormTexts,
  previewed: Specification | null,
  everyPoint: readonly NoteSummary[] | null,
  points: number,
): QuestionNote[] {
  const control = (field: string) => controlOf(model, texts, withPart(model, field));
  if (everyPoint)
    return everyPoint.map((note, i) => ({
      key: `${note.code} ${note.severity} ${note.field}`,
      letter: letters[i % letters.length] as string,
      severity: note.severity,
      control: control(note.field),
      text: `${noteText(model, { code: note.code, value: note.worst, limit: note.limit, unit: note.unit })}${
        points > 1 ? ` In ${note.points} of ${points} jobs.` : ''
      }`,
    }));
  if (!previewed) return [];
  return validityOf(model, previewed).map((note, i) => ({
    key: `${note.code} ${note.severity} ${note.field}`,
    letter: letters[i % letters.length] as string,
    severity: note.severity,
    control: control(note.field),
    text: note.text,
  }));
}

/** A pointer of a note with or without its part in front. */
function withPart(model: ModelDefinition, field: string): string {
  if (/^\/(parameters|numerics)(\/|$)/.test(field)) return field;
  const name = field.split('/')[1];
  const part = model.numerics.some((each) => each.name === name) ? 'numerics' : 'parameters';
  return `/${part}${field}`;
}

export function notesByControl(notes: readonly QuestionNote[]): Map<string, QuestionNote[]> {
  const byControl = new Map<string, QuestionNote[]>();
  for (const note of notes) byControl.set(note.control, [...(byControl.get(note.control) ?? []), note]);
  return byControl;
}
