import type { KernelManifest, ModelDefinition, ModelManifest } from './definition.ts';
import type { Field, FieldType } from './fields.ts';

/**
 * What a kernel carries of the models it was built with: everything needed to validate, encode, slice and name
 * results; no titles, symbols or help, so that a mended sentence changes no digest.
 */
export function manifestOf(models: readonly ModelDefinition[], version: string): KernelManifest {
  return { interface: 1, version, models: models.map(modelManifest) };
}

function modelManifest(model: ModelDefinition): ModelManifest {
  return {
    id: model.id,
    parameters: model.parameters.map(bareField),
    numerics: model.numerics.map(bareField),
    results: model.results.map(withoutDisplay),
    certificate: model.certificate,
    checks: model.checks.map(withoutDisplay),
    sliceCount: model.sliceCount,
    cost: model.cost,
    assembleCost: model.assembleCost,
    sliceBytes: model.sliceBytes,
    assembleBytes: model.assembleBytes,
    resultBytes: model.resultBytes,
  };
}

function bareField(field: Field): Field {
  return { ...withoutDisplay(field), ...bareType(field) } as Field;
}

/** The type with its nested members stripped as well. */
function bareType(type: FieldType): Partial<FieldType> {
  switch (type.type) {
    case 'choice':
      return { kinds: type.kinds.map(({ kind, members }) => ({ kind, members: members.map(bareField) })) };
    case 'group':
      return { members: type.members.map(bareField) };
    case 'list':
      return { items: { ...withoutDisplay(type.items), ...bareType(type.items) } as FieldType };
    default:
      return {};
  }
}

function withoutDisplay<T extends object>(value: T): Omit<T, 'display'> {
  const { display: _, ...rest } = value as T & { display?: unknown };
  return rest;
}
