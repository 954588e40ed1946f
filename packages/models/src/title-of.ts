import type { ModelDefinition } from './definition.ts';
import type { SpecificationBody } from './expression.ts';
import { chosenMembers } from './field-at.ts';
import type { Field, Json } from './fields.ts';
import { formatNumber, formatQuantity } from './format-quantity.ts';

const mostParts = 4;

/**
 * A short title of a specification for lists: the model, then the geometry, then what was changed from the defaults,
 * e.g. `Continuum ribbon: armchair, N = 40, B = 10 T`.
 */
export function titleOf(model: Pick<ModelDefinition, 'title' | 'parameters'>, body: SpecificationBody): string {
  const geometry = model.parameters.filter((field) => field.display?.group === 'geometry');
  const others = model.parameters.filter((field) => !geometry.includes(field) && isChanged(field, body));
  const parts = [...geometry, ...others].flatMap((field) => fieldParts(field, body.parameters[field.name]));
  if (parts.length === 0) return model.title;
  const shown = parts.slice(0, mostParts).join(', ');
  return `${model.title}: ${shown}${parts.length > mostParts ? ', …' : ''}`;
}

function isChanged(field: Field, body: SpecificationBody): boolean {
  const value = body.parameters[field.name];
  return value !== undefined && JSON.stringify(sorted(value)) !== JSON.stringify(sorted(field.default ?? null));
}

function fieldParts(field: Field, value: Json | undefined): string[] {
  if (value === undefined) return [];
  const name = plainSymbol(field);
  switch (field.type) {
    case 'number':
      return typeof value === 'number' ? [`${name} = ${formatQuantity(value, field.unit)}`] : [];
    case 'integer':
      return typeof value === 'number' ? [`${name} = ${formatNumber(value, 17)}`] : [];
    case 'auto-number':
      return [typeof value === 'number' ? `${name} = ${formatQuantity(value, field.unit)}` : `${name} auto`];
    case 'enum':
      return [`${field.display?.title ?? field.name} ${value}`];
    case 'boolean':
      return [value === true ? name : `no ${name}`];
    case 'axis':
      return axisParts(name, field.unit, value);
    case 'choice':
      return choiceParts(field, value);
    case 'list':
      return Array.isArray(value) ? [`${value.length} ${field.display?.title ?? field.name}`] : [];
    case 'group':
      return isObject(value) ? field.members.flatMap((member) => fieldParts(member, value[member.name])) : [];
    case 'table':
      return [`table ${String(value).slice(0, 4)}`];
  }
}

function axisParts(name: string, unit: string, value: Json): string[] {
  if (typeof value === 'number') return [`${name} = ${formatQuantity(value, unit)}`];
  if (!isObject(value)) return [];
  const { kind, start, stop, count, values } = value;
  if (kind === 'range' && typeof start === 'number' && typeof stop === 'number')
    return [`${name} ${formatNumber(start)}…${formatQuantity(stop, unit)} (${count})`];
  return kind === 'values' && Array.isArray(values)
    ? [`${values.length} values of ${name}`]
    : [`${name} over the zone`];
}

/** Kinds whose members are counts or lengths speak through them; others by their title. */
function choiceParts(field: Extract<Field, { type: 'choice' }>, value: Json): string[] {
  if (!isObject(value)) return [];
  const chosen = field.kinds.find(({ kind }) => kind === value.kind);
  const members = chosenMembers(field, value).filter((member) => ['number', 'integer'].includes(member.type));
  const isMeasure = field.kinds.every(({ members: each }) => each.length > 0) && field.display?.group === 'geometry';
  const told = members.filter((member) => isMeasure || value[member.name] !== member.default);
  const parts = told.flatMap((member) => fieldParts(member, value[member.name]));
  const title = chosen?.display?.title ?? String(value.kind);
  const named = field.display?.group === 'geometry' ? title : `${field.display?.title ?? field.name} ${title}`;
  return isMeasure ? parts : [named, ...parts];
}

/** The symbol where it is a plain letter (perhaps Greek), else the title. */
function plainSymbol(field: Field): string {
  const symbol = field.display?.symbol ?? '';
  if (/^[A-Za-z]$/.test(symbol)) return symbol;
  const subscript = /^([A-Za-z])_(?:([0-9a-z])|\{([a-z]+)\})$/.exec(symbol);
  if (subscript) return `${subscript[1]}${subscript[2] ?? subscript[3]}`;
  return field.display?.title ?? field.name;
}

const isObject = (value: Json): value is { [key: string]: Json } =>
  typeof value === 'object' && value !== null && !Array.isArray(value);

/** The same value with its names in order, for comparing texts. */
function sorted(value: Json): Json {
  if (Array.isArray(value)) return value.map(sorted);
  if (!isObject(value)) return value;
  return Object.fromEntries(
    Object.keys(value)
      .sort()
      .map((key) => [key, sorted(value[key] ?? null)]),
  );
}
