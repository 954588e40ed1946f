import type { FieldType, Json } from './fields.ts';
import { nearestName } from './nearest-name.ts';

/** What is wrong with one place of a specification: in words, with what was given and what is allowed. */
export interface SpecificationProblem {
  /** JSON Pointer into the specification. */
  field: string;
  message: string;
  value: Json | undefined;
  limit: string;
}

const withUnit = (text: string, unit: string) => (unit === '' ? text : `${text} ${unit}`);

/** Given values as they read in a message; long ones are cut. */
export function quoteValue(value: unknown): string {
  if (value === undefined) return 'missing';
  if (typeof value === 'number') return String(value);
  const text = typeof value === 'string' ? `“${value}”` : (JSON.stringify(value) ?? typeof value);
  return text.length > 60 ? `${text.slice(0, 57)}…` : text;
}

/** The allowed values of a type, in words. */
export function allowedText(type: FieldType): string {
  switch (type.type) {
    case 'number':
      return type.exclusiveMin
        ? `more than ${type.min} and at most ${withUnit(String(type.max), type.unit)}`
        : withUnit(`${type.min} to ${type.max}`, type.unit);
    case 'integer':
      return `a whole number from ${type.min} to ${type.max}`;
    case 'boolean':
      return 'true or false';
    case 'enum':
      return `one of ${type.values.join(', ')}`;
    case 'choice':
      return `an object with "kind", one of ${type.kinds.map(({ kind }) => kind).join(', ')}`;
    case 'axis': {
      const kinds = type.wholeZone ? 'range, values or whole-zone' : 'range or values';
      return `a number, or an object of kind ${kinds}, within ${withUnit(`${type.min} to ${type.max}`, type.unit)} and of at most ${type.maxCount} points`;
    }
    case 'auto-number':
      return `{"kind":"auto"} or a number within ${withUnit(`${type.min} to ${type.max}`, type.unit)}`;
    case 'group':
      return `an object with ${type.members.map(({ name }) => name).join(', ')}`;
    case 'list':
      return `a list of ${type.minItems} to ${type.maxItems} items`;
    case 'table':
      return 'the digest of an uploaded table, 64 hexadecimal digits';
  }
}

/** A value that does not fit its type. `name` is the last part of the path, `value` what was given there. */
export function explainMisfit(name: string, type: FieldType, value: Json | undefined): string {
  const numeric = type.type === 'number' || type.type === 'axis' || type.type === 'auto-number';
  if (numeric && typeof value === 'string')
    return `${name} is the text ${quoteValue(value)}; it must be a bare number${type.unit === '' ? '' : ` in ${type.unit}`}.`;
  if ((numeric || type.type === 'integer') && typeof value === 'number' && !Number.isFinite(value))
    return `${name} is ${value}, which is no finite number.`;
  if (type.type === 'list' && Array.isArray(value))
    return `${name} has ${value.length} items; it takes ${type.minItems} to ${type.maxItems}.`;
  if (type.type === 'choice' && typeof value === 'object' && value !== null && !Array.isArray(value)) {
    const known = type.kinds.map(({ kind }) => kind);
    if (value.kind === undefined) return `${name} is given without its "kind"; it is one of ${known.join(', ')}.`;
    return `${name} has the unknown kind ${quoteValue(value.kind)}; the nearest known kind is ${nearestName(String(value.kind), known)}.`;
  }
  if (type.type === 'enum' && typeof value === 'string')
    return `${name} is ${quoteValue(value)}; the nearest known value is ${nearestName(value, type.values)}.`;
  const given = value === undefined ? 'is missing' : `is ${quoteValue(value)}`;
  return `${name} ${given}; it must be ${allowedText(type)}.`;
}

/** A count of points above the limit of its axis: the number of points and the limit decide, nothing is expanded. */
export function explainCount(name: string, count: number, maxCount: number): string {
  return count > maxCount
    ? `${name} asks for ${count} points; an axis holds at most ${maxCount}.`
    : `${name} asks for ${count} points; a range needs a whole number of at least 2.`;
}

/** A name that the model does not know. */
export function explainUnknown(name: string, known: readonly string[]): { message: string; limit: string } {
  const nearest = nearestName(name, known);
  return {
    message: nearest
      ? `“${name}” is unknown here; the nearest known name is ${nearest}.`
      : `“${name}” is unknown here; nothing is expected.`,
    limit: known.length > 0 ? `known: ${known.join(', ')}` : 'no members',
  };
}
