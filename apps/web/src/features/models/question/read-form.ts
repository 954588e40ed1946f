import type { SweepAxisInput } from '@nightcone/contracts';
import { limits } from '@nightcone/contracts';
import {
  type ChoiceType,
  decimalText,
  type Field,
  type FieldType,
  isRangeText,
  type Json,
  parseAxis,
  parseNumber,
  parseRange,
  rangeValues,
} from '@nightcone/models';
import {
  countName,
  type FormModel,
  type FormTexts,
  kindName,
  memberName,
  otherAxesName,
  type Part,
  pointerOfName,
  togetherName,
} from './form-texts.ts';

/** A control whose text stands for many jobs. */
export interface SweptControl {
  name: string;
  pointer: string;
  field: Field;
  values: number[];
  /** Decimal ends, where the text is a range. */
  range?: { start: string; stop: string; count: number };
}

export interface ReadProblem {
  /** Name of the control. */
  name: string;
  message: string;
}

export interface ReadForm {
  /** Swept controls hold the value of their first point. */
  parameters: { [name: string]: Json };
  numerics: { [name: string]: Json };
  swept: SweptControl[];
  problems: ReadProblem[];
}

/** What the texts of a form mean. Ranges of allowed values are checked later, by the model's schema. */
export function readForm(model: FormModel, texts: FormTexts): ReadForm {
  const read: ReadForm = { parameters: {}, numerics: {}, swept: [], problems: [] };
  for (const part of ['parameters', 'numerics'] as const)
    for (const field of model[part]) read[part][field.name] = readType(read, texts, nameOf(part, field), field, field);
  return read;
}

export const nameOf = (part: Part, field: Field) => `${part}/${field.name}`;

function readType(read: ReadForm, texts: FormTexts, name: string, type: FieldType, field: Field): Json {
  const text = (texts[name] ?? '').trim();
  switch (type.type) {
    case 'choice':
      return readChoice(read, texts, name, type);
    case 'group':
      return Object.fromEntries(
        type.members.map((member) => [member.name, readType(read, texts, `${name}/${member.name}`, member, member)]),
      );
    case 'list':
      return readList(read, texts, name, type, field);
    case 'axis':
      return readAxis(read, name, text, type);
    case 'auto-number':
      return /^(auto|)$/i.test(text) ? { kind: 'auto' } : readNumber(read, name, text, type.unit);
    case 'number':
    case 'integer':
      return readSweptNumber(read, name, text, type, field);
    case 'boolean':
      return text === 'true';
    default:
      return text;
  }
}

function problem(read: ReadForm, name: string, message: string): void {
  read.problems.push({ name, message });
}

function readNumber(read: ReadForm, name: string, text: string, unit: string): number {
  const number = parseNumber(text, unit);
  if (number.ok) return number.value;
  problem(read, name, number.message);
  return 0;
}

const listText = /^\[(.*)\]$/s;

/** A number, or `2..14 / 25`, or `2, 4, 8`: the last two make a sweep of this control. */
function readSweptNumber(
  read: ReadForm,
  name: string,
  text: string,
  type: { type: string; unit?: string },
  field: Field,
): number {
  const unit = type.unit ?? '';
  const bracketed = listText.exec(text)?.[1];
  if (isRangeText(text)) {
    const range = parseRange(text, unit, limits.sweepPoints);
    if (!range.ok) {
      problem(read, name, range.message);
      return 0;
    }
    const { start, stop, count } = range.value;
    const values = rangeValues(range.value);
    if (type.type === 'integer' && !values.every(Number.isInteger)) {
      problem(read, name, `The ${count} values of this range are not all whole; another count makes them so.`);
      return Math.round(values[0] ?? 0);
    }
    addSwept(read, name, field, values, { start: decimalText(start), stop: decimalText(stop), count });
    return values[0] ?? 0;
  }
  if (bracketed !== undefined || /[;,]\s/.test(text) || text.includes(';')) {
    const values = readNumbers(read, name, bracketed ?? text, unit);
    if (values.length > 0) addSwept(read, name, field, values);
    return values[0] ?? 0;
  }
  return readNumber(read, name, text, unit);
}

function addSwept(read: ReadForm, name: string, field: Field, values: number[], range?: SweptControl['range']) {
  read.swept.push({ name, pointer: pointerOfName(name), field, values, ...(range ? { range } : {}) });
}

function readNumbers(read: ReadForm, name: string, text: string, unit: string): number[] {
  const values: number[] = [];
  for (const part of text.split(/;|,/)) {
    if (part.trim() === '') continue;
    const number = parseNumber(part, unit);
    if (!number.ok) {
      problem(read, name, number.message);
      return [];
    }
    values.push(number.value);
  }
  return values;
}

function readAxis(read: ReadForm, name: string, text: string, type: Extract<FieldType, { type: 'axis' }>): Json {
  const zone = /^whole zone\s*\/\s*(\d+)$/i.exec(text);
  if (zone) return { kind: 'whole-zone', count: Number(zone[1]) };
  const bracketed = listText.exec(text)?.[1];
  if (bracketed !== undefined) return { kind: 'values', values: readNumbers(read, name, bracketed, type.unit) };
  const axis = parseAxis(text, type.unit, type.maxCount);
  if (axis.ok) return axis.value as Json;
  problem(read, name, axis.message);
  return 0;
}

function readList(
  read: ReadForm,
  texts: FormTexts,
  name: string,
  type: Extract<FieldType, { type: 'list' }>,
  field: Field,
): Json {
  const { items } = type;
  if (items.type === 'number' || items.type === 'integer')
    return readNumbers(read, name, texts[name] ?? '', items.type === 'number' ? items.unit : '');
  if (items.type === 'choice' || items.type === 'group') {
    const count = Number(texts[countName(name)] ?? 0);
    return Array.from({ length: count }, (_, i) => readType(read, texts, `${name}/${i}`, items, field));
  }
  return (texts[name] ?? '')
    .split(/[;,]/)
    .map((each) => each.trim())
    .filter(Boolean);
}

function readChoice(read: ReadForm, texts: FormTexts, name: string, type: ChoiceType): Json {
  const kind = texts[kindName(name)] ?? '';
  const chosen = type.kinds.find((each) => each.kind === kind);
  if (!chosen) {
    problem(read, name, 'One of the kinds must be chosen.');
    return { kind };
  }
  return Object.fromEntries([
    ['kind', kind],
    ...chosen.members.map((member) => [
      member.name,
      readType(read, texts, memberName(name, kind, member.name), member, member),
    ]),
  ]);
}

/** The axes of the sweep in the order of the form; controls that vary together share one. */
export function readAxes(swept: readonly SweptControl[], texts: FormTexts): SweepAxisInput[] {
  const groups: SweptControl[][] = [];
  for (const control of swept) {
    const partner = texts[togetherName(control.name)];
    const group = groups.find(
      (each) => each.some(({ name }) => name === partner) && each[0]?.values.length === control.values.length,
    );
    if (group) group.push(control);
    else groups.push([control]);
  }
  const axes = groups.map((group): SweepAxisInput => {
    const [first] = group as [SweptControl, ...SweptControl[]];
    if (group.length === 1 && first.range) return { pointers: [first.pointer], range: first.range };
    return {
      pointers: group.map(({ pointer }) => pointer),
      values: first.values.map((_, i) => group.map((control) => control.values[i] as number)),
    };
  });
  return [...axes, ...otherAxes(texts)];
}

/** Axes kept as JSON because no control can hold them. */
export function otherAxes(texts: FormTexts): SweepAxisInput[] {
  try {
    const axes: unknown = JSON.parse(texts[otherAxesName] || '[]');
    return Array.isArray(axes) ? (axes as SweepAxisInput[]) : [];
  } catch {
    return [];
  }
}
