import type { Field, FieldType, Json } from './fields.ts';

type Members = readonly Field[];

/**
 * The type at a path below `fields`, following the kinds that `value` has chosen; undefined where nothing is known.
 * A member of a kind that is not chosen is no type of this value.
 */
export function typeAt(fields: Members, value: unknown, tokens: readonly (string | number)[]): FieldType | undefined {
  const [name, ...rest] = tokens;
  const field = fields.find((candidate) => candidate.name === name);
  return field && typeBelow(field, own(value, String(name)), rest);
}

function typeBelow(type: FieldType, value: unknown, tokens: readonly (string | number)[]): FieldType | undefined {
  if (tokens.length === 0) return type;
  switch (type.type) {
    case 'choice':
      return typeAt(chosenMembers(type, value), value, tokens);
    case 'group':
      return typeAt(type.members, value, tokens);
    case 'list':
      return typeBelow(type.items, own(value, String(tokens[0])), tokens.slice(1));
    case 'axis': {
      const part = axisPart(type, String(tokens[0]));
      return part && typeBelow(part, own(value, String(tokens[0])), tokens.slice(1));
    }
    default:
      return undefined;
  }
}

/** Members of the kind that a choice's value names; none where it names no known kind. */
export function chosenMembers(type: Extract<FieldType, { type: 'choice' }>, value: unknown): Members {
  const chosen = own(value, 'kind');
  return type.kinds.find(({ kind }) => kind === chosen)?.members ?? [];
}

/** What an axis object holds under a name, as a field type of its own. */
function axisPart(axis: Extract<FieldType, { type: 'axis' }>, name: string): FieldType | undefined {
  const number: FieldType = { type: 'number', unit: axis.unit, min: axis.min, max: axis.max };
  if (name === 'start' || name === 'stop') return number;
  if (name === 'count') return { type: 'integer', min: 2, max: axis.maxCount };
  if (name === 'values') return { type: 'list', items: number, minItems: 1, maxItems: axis.maxCount };
  return undefined;
}

/** Is there any choice of kinds under which this path exists? Finds misspelt pointers in expressions and sweeps. */
export function pathExists(fields: Members, tokens: readonly (string | number)[]): boolean {
  const [name, ...rest] = tokens;
  const field = fields.find((candidate) => candidate.name === name);
  return field !== undefined && existsBelow(field, rest);
}

function existsBelow(type: FieldType, tokens: readonly (string | number)[]): boolean {
  if (tokens.length === 0) return true;
  switch (type.type) {
    case 'choice':
      return type.kinds.some(({ members }) => pathExists(members, tokens));
    case 'group':
      return pathExists(type.members, tokens);
    case 'list':
      return /^[0-9]+$/.test(String(tokens[0])) && existsBelow(type.items, tokens.slice(1));
    case 'axis': {
      const part = axisPart(type, String(tokens[0]));
      return part !== undefined && existsBelow(part, tokens.slice(1));
    }
    default:
      return false;
  }
}

function own(value: unknown, name: string): Json | undefined {
  return typeof value === 'object' && value !== null && Object.hasOwn(value, name)
    ? (value as Record<string, Json>)[name]
    : undefined;
}
