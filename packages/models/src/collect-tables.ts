import type { SpecificationBody } from './expression.ts';
import { chosenMembers } from './field-at.ts';
import type { Field, FieldType, Json } from './fields.ts';

/** Digests of the tables that a complete specification refers to: distinct, in ascending order. */
export function collectTables(model: { parameters: Field[]; numerics: Field[] }, body: SpecificationBody): string[] {
  const digests = new Set<string>();
  visitMembers(model.parameters, body.parameters, digests);
  visitMembers(model.numerics, body.numerics, digests);
  return [...digests].sort();
}

function visitMembers(fields: readonly Field[], value: Json | undefined, digests: Set<string>): void {
  if (typeof value !== 'object' || value === null || Array.isArray(value)) return;
  for (const field of fields) visit(field, value[field.name], digests);
}

function visit(type: FieldType, value: Json | undefined, digests: Set<string>): void {
  if (type.type === 'table' && typeof value === 'string') digests.add(value);
  else if (type.type === 'choice') visitMembers(chosenMembers(type, value), value, digests);
  else if (type.type === 'group') visitMembers(type.members, value, digests);
  else if (type.type === 'list' && Array.isArray(value)) for (const item of value) visit(type.items, item, digests);
}
