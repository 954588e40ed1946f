import type { SweepAxisInput } from '@nightcone/contracts';
import {
  type Field,
  type Json,
  parseRange,
  pointerTokens,
  rangeValues,
  typeAt,
  type WorkedExample,
} from '@nightcone/models';
import {
  type FormModel,
  type FormTexts,
  memberName,
  numberText,
  otherAxesName,
  titleName,
  togetherName,
  writeBody,
} from './form-texts.ts';

export interface Question {
  parameters?: { [name: string]: Json };
  numerics?: { [name: string]: Json };
  axes?: readonly SweepAxisInput[];
  title?: string;
}

export const questionOfExample = (example: WorkedExample): Question => ({
  parameters: example.parameters,
  title: example.title,
  ...(example.numerics ? { numerics: example.numerics } : {}),
  ...(example.sweep ? { axes: example.sweep } : {}),
});

/** Texts of a question with its sweep: a swept number shows its range or its list of values. */
export function fillForm(model: FormModel, question: Question): FormTexts {
  const texts = writeBody(model, question);
  const others: SweepAxisInput[] = [];
  for (const axis of question.axes ?? []) {
    const names = axis.pointers.map((pointer) => controlName(model, question, pointer));
    if (names.some((name) => name === null)) {
      others.push(axis);
      continue;
    }
    const columns = axis.pointers.map((_, i) => columnText(axis, i));
    if (columns.some((text) => text === null)) {
      others.push(axis);
      continue;
    }
    names.forEach((name, i) => {
      texts[name as string] = columns[i] as string;
      if (i > 0) texts[togetherName(name as string)] = names[0] as string;
    });
  }
  texts[titleName] = question.title ?? '';
  if (others.length > 0) texts[otherAxesName] = JSON.stringify(others);
  return texts;
}

/** Name of the number control at a pointer, following the kinds that the question chooses; null: none. */
function controlName(model: FormModel, question: Question, pointer: string): string | null {
  const tokens = pointerTokens(pointer);
  for (const part of ['parameters', 'numerics'] as const) {
    const body = defaultsOf(model[part], question[part] ?? {});
    const type = typeAt(model[part], body, tokens);
    if (!type || (type.type !== 'number' && type.type !== 'integer')) continue;
    let name = `${part}/${tokens[0]}`;
    let at: Json | undefined = body[tokens[0] as string];
    let field = model[part].find((each) => each.name === tokens[0]) as Field | undefined;
    for (const token of tokens.slice(1)) {
      if (field?.type === 'choice' && isObject(at)) {
        const kind = String(at.kind);
        name = memberName(name, kind, token);
        field = field.kinds.find((each) => each.kind === kind)?.members.find((each) => each.name === token);
      } else if (field?.type === 'group') {
        name = `${name}/${token}`;
        field = field.members.find((each) => each.name === token);
      } else return null;
      at = isObject(at) ? at[token] : undefined;
    }
    return name;
  }
  return null;
}

const isObject = (value: Json | undefined): value is { [key: string]: Json } =>
  typeof value === 'object' && value !== null && !Array.isArray(value);

const defaultsOf = (fields: readonly Field[], given: { [name: string]: Json }): { [name: string]: Json } =>
  Object.fromEntries(fields.map((field) => [field.name, given[field.name] ?? field.default ?? null]));

/** Text of one pointer's values: a range where the decimals say so, else a list; null where they are no numbers. */
function columnText(axis: SweepAxisInput, column: number): string | null {
  if (axis.range) return `${axis.range.start}..${axis.range.stop} / ${axis.range.count}`;
  const values = (axis.values ?? []).map((each) => each[column]);
  if (values.length === 0 || !values.every((value): value is number => typeof value === 'number')) return null;
  const range = `${numberText(values[0] as number)}..${numberText(values.at(-1) as number)} / ${values.length}`;
  return isRange(values, range)
    ? range
    : values.length === 1
      ? `[${numberText(values[0] as number)}]`
      : values.map(numberText).join(', ');
}

/** Does the range text make exactly these values? */
function isRange(values: readonly number[], text: string): boolean {
  if (values.length < 3) return false;
  const range = parseRange(text, '', values.length);
  if (!range.ok) return false;
  const made = rangeValues(range.value);
  return made.every((value, i) => value === values[i]);
}
