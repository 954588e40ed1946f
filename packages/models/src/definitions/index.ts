import type { ModelDefinition } from '../definition.ts';
import { continuumRibbon } from './continuum-ribbon/definition.ts';
import { landauLevels } from './landau-levels/definition.ts';

/** All models, in the order of their index in the kernel: append only. */
export const models: readonly ModelDefinition[] = [landauLevels, continuumRibbon];

export function findModel(id: string): ModelDefinition | undefined {
  return models.find((model) => model.id === id);
}
