import { findModel, type Specification, titleOf } from '@nightcone/models';

/** A title made from what the job computes: the same for everybody. */
export function jobTitle(specification: unknown): string {
  const { model, parameters, numerics } = specification as Specification;
  const definition = findModel(model);
  return definition ? titleOf(definition, { parameters, numerics }) : model;
}
