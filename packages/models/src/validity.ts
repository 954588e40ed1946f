import type { ModelDefinition, ValidityNote } from './definition.ts';
import type { SpecificationBody } from './expression.ts';
import { formatQuantity } from './format-quantity.ts';

/** A validity note with its sentence. */
export interface WordedNote extends ValidityNote {
  text: string;
}

/** The sentence of a note: the model's text with value and limit filled in as quantities. */
export function noteText(
  model: Pick<ModelDefinition, 'noteTexts'>,
  note: Omit<ValidityNote, 'field' | 'severity'>,
): string {
  const text = model.noteTexts[note.code] ?? `${note.code}: {value} against {limit}.`;
  return text
    .replaceAll('{value}', formatQuantity(note.value, note.unit))
    .replaceAll('{limit}', formatQuantity(note.limit, note.unit));
}

const severities = { refuse: 0, caution: 1, note: 2 } as const;

/** The validity notes of a complete specification, the gravest first. Numbers are made with + − × ÷ √ only. */
export function validityOf(model: Pick<ModelDefinition, 'notes' | 'noteTexts'>, body: SpecificationBody): WordedNote[] {
  return model
    .notes(body)
    .map((note) => ({ ...note, text: noteText(model, note) }))
    .sort((a, b) => severities[a.severity] - severities[b.severity]);
}

/** One note over the points of a sweep. */
export interface NoteOfPoints {
  code: string;
  severity: ValidityNote['severity'];
  field: string;
  unit: string;
  limit: number;
  /** The value furthest from its limit, and `limit` there. */
  worst: number;
  points: number;
  firstPoints: number[];
}

/** Gathers the notes of many points: one entry for every code and severity, with the worst value and where it is. */
export class NoteCollector {
  private readonly byCode = new Map<string, NoteOfPoints>();

  constructor(private readonly keptPoints = 20) {}

  add(point: number, notes: readonly ValidityNote[]): void {
    for (const { code, severity, field, unit, limit, value } of notes) {
      const key = `${severity} ${code} ${field}`;
      const known = this.byCode.get(key);
      if (known === undefined) {
        this.byCode.set(key, { code, severity, field, unit, limit, worst: value, points: 1, firstPoints: [point] });
        continue;
      }
      known.points += 1;
      if (known.firstPoints.length < this.keptPoints) known.firstPoints.push(point);
      if (distance(value, limit) > distance(known.worst, known.limit)) {
        known.worst = value;
        known.limit = limit;
      }
    }
  }

  /** The gravest first, then by how many points carry it. */
  summary(): NoteOfPoints[] {
    return [...this.byCode.values()].sort(
      (a, b) => severities[a.severity] - severities[b.severity] || b.points - a.points,
    );
  }
}

const distance = (a: number, b: number) => (a > b ? a - b : b - a);
