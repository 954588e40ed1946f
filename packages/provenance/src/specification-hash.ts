import type { Field, FieldType, Json, KernelManifest, Specification } from '@nightcone/kernel';
import { canonicalJson } from './canonical.ts';
import { sha256Hex } from './sha256.ts';

/** Canonical JSON of a complete specification: the text that the job hash is taken of. */
export function canonicalText(specification: Specification): string {
  const { schema, model, parameters, numerics, tables, kernel } = specification;
  return canonicalJson({ schema, model, parameters, numerics, tables, kernel });
}

/** SHA-256 of the canonical text of a complete specification. The same inputs are the same job. */
export function jobHash(specification: Specification): Promise<string> {
  return sha256Hex(canonicalText(specification));
}

/**
 * Digest of the question behind a job, whatever the kernel: the specification as `nightcone.question/1`, without
 * `kernel` and without every member that equals its default (nested members too).
 */
export function questionDigest(manifest: KernelManifest, specification: Specification): Promise<string> {
  return sha256Hex(questionText(manifest, specification));
}

export function questionText(manifest: KernelManifest, specification: Specification): string {
  const model = manifest.models.find(({ id }) => id === specification.model);
  if (!model) throw new RangeError(`the kernel has no model ${specification.model}`);
  return canonicalJson({
    schema: 'nightcone.question/1',
    model: specification.model,
    parameters: withoutDefaults(model.parameters, specification.parameters),
    numerics: withoutDefaults(model.numerics, specification.numerics),
    tables: specification.tables,
  });
}

function withoutDefaults(fields: readonly Field[], values: { [name: string]: Json }): { [name: string]: Json } {
  const kept: { [name: string]: Json } = {};
  for (const field of fields) {
    const value = values[field.name];
    if (value === undefined) continue;
    if (field.default !== undefined && isDefault(field, field.default, value)) continue;
    const bare = withoutInnerDefaults(field, value);
    const emptyGroup = field.type === 'group' && Object.keys(bare as object).length === 0;
    if (!emptyGroup) kept[field.name] = bare;
  }
  return kept;
}

/** A default may itself leave defaults out; both sides are compared without them. */
function isDefault(field: Field, fallback: Json, value: Json): boolean {
  // Numbers, words and booleans are most of a specification, and a sweep asks for thousands of points.
  if (typeof value !== 'object') return value === fallback;
  return defaultText(field, fallback) === canonicalJson(withoutInnerDefaults(field, value));
}

const defaultTexts = new WeakMap<Field, string>();

function defaultText(field: Field, fallback: Json): string {
  const known = defaultTexts.get(field);
  if (known !== undefined) return known;
  const text = canonicalJson(withoutInnerDefaults(field, fallback));
  defaultTexts.set(field, text);
  return text;
}

function withoutInnerDefaults(type: FieldType, value: Json): Json {
  if (type.type === 'list' && Array.isArray(value)) return value.map((item) => withoutInnerDefaults(type.items, item));
  if (typeof value !== 'object' || value === null || Array.isArray(value)) return value;
  if (type.type === 'choice') {
    const chosen = type.kinds.find(({ kind }) => kind === value.kind);
    return { kind: value.kind ?? null, ...withoutDefaults(chosen?.members ?? [], value) };
  }
  return type.type === 'group' ? withoutDefaults(type.members, value) : value;
}
