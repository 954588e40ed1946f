import type { ChoiceType, Field, FieldType, Json } from '@nightcone/models';

/**
 * What stands in the form: one text for every control, by a name that holds its place and the kinds above it, e.g.
 * `parameters/width:dimer-lines/count`. Members of kinds that are not chosen keep their texts, so nothing typed is lost
 * by looking at another kind. The names are flat, as the form library takes dots for nesting.
 */
export type FormTexts = Record<string, string>;

export type Part = 'parameters' | 'numerics';
export interface FormModel {
  id: string;
  parameters: Field[];
  numerics: Field[];
}

export const kindName = (name: string) => `${name}#kind`;
export const countName = (name: string) => `${name}#count`;
export const memberName = (name: string, kind: string, member: string) => `${name}:${kind}/${member}`;
/** Name of the control that this swept one varies together with; empty: an axis of its own. */
export const togetherName = (name: string) => `${name}#with`;

/** Axes that no single control can hold (whole choices, whole axes), as JSON. */
export const otherAxesName = '#axes';
/** The title under which the question is submitted; empty: made from the question. */
export const titleName = '#title';

/** JSON Pointer into parameters or numerics of a control's name. */
export const pointerOfName = (name: string): string =>
  `/${name
    .split('/')
    .slice(1)
    .map((token) => token.replace(/[:#].*$/, ''))
    .join('/')}`;

/** The shortest text that reads back as this number. */
export const numberText = (value: number): string => String(value === 0 ? 0 : value);

const valuesText = (values: readonly Json[]): string => {
  const text = values.map((value) => (typeof value === 'number' ? numberText(value) : String(value))).join(', ');
  return values.length === 1 ? `[${text}]` : text;
};

export function axisText(value: Json | undefined): string {
  if (typeof value === 'number') return numberText(value);
  if (typeof value !== 'object' || value === null || Array.isArray(value)) return '';
  if (Array.isArray(value.values)) return valuesText(value.values);
  const count = String(value.count ?? '');
  if (value.kind === 'whole-zone') return `whole zone / ${count}`;
  return `${numberText(Number(value.start))}..${numberText(Number(value.stop))} / ${count}`;
}

const isScalar = (type: FieldType) => ['number', 'integer', 'enum', 'boolean', 'table'].includes(type.type);

/** Writes a value into texts; what the value leaves out takes its default. */
export function writeValue(texts: FormTexts, name: string, type: FieldType, value: Json | undefined): void {
  switch (type.type) {
    case 'choice':
      writeChoice(texts, name, type, value);
      break;
    case 'group':
      for (const member of type.members) writeField(texts, `${name}/${member.name}`, member, own(value, member.name));
      break;
    case 'list': {
      const items = Array.isArray(value) ? value : [];
      if (isScalar(type.items)) {
        texts[name] = items.map((item) => (typeof item === 'number' ? numberText(item) : String(item))).join(', ');
      } else {
        texts[countName(name)] = String(items.length);
        items.forEach((item, i) => {
          writeValue(texts, `${name}/${i}`, type.items, item);
        });
      }
      break;
    }
    case 'axis':
      texts[name] = axisText(value);
      break;
    case 'auto-number':
      texts[name] = typeof value === 'number' ? numberText(value) : 'auto';
      break;
    default:
      texts[name] = typeof value === 'number' ? numberText(value) : value === undefined ? '' : String(value);
  }
}

export function writeField(texts: FormTexts, name: string, field: Field, value: Json | undefined): void {
  writeValue(texts, name, field, value === undefined ? field.default : value);
}

function writeChoice(texts: FormTexts, name: string, type: ChoiceType, value: Json | undefined): void {
  const chosen = own(value, 'kind') ?? type.kinds[0]?.kind;
  texts[kindName(name)] = String(chosen ?? '');
  for (const { kind, members } of type.kinds)
    for (const member of members) {
      const at = memberName(name, kind, member.name);
      if (kind === chosen) writeField(texts, at, member, own(value, member.name));
      else if (texts[at] === undefined && texts[kindName(at)] === undefined) writeField(texts, at, member, undefined);
    }
}

/** Texts of a whole body; absent fields take their defaults. */
export function writeBody(
  model: FormModel,
  body: { parameters?: { [name: string]: Json }; numerics?: { [name: string]: Json } },
): FormTexts {
  const texts: FormTexts = {};
  for (const part of ['parameters', 'numerics'] as const)
    for (const field of model[part]) writeField(texts, `${part}/${field.name}`, field, body[part]?.[field.name]);
  texts[otherAxesName] = '';
  texts[titleName] = '';
  return texts;
}

function own(value: Json | undefined, name: string): Json | undefined {
  return typeof value === 'object' && value !== null && !Array.isArray(value) && Object.hasOwn(value, name)
    ? value[name]
    : undefined;
}
