import type { ModelDefinition } from '../../definition.ts';
import { examples, preview } from './examples.ts';
import { methods } from './methods.ts';
import { notes, noteTexts } from './notes.ts';
import { numerics } from './numerics.ts';
import { parameters } from './parameters.ts';
import { certificate, checks, results } from './results.ts';
import { assembleBytes, assembleCost, cost, resultBytes, sliceBytes, sliceCount } from './size.ts';

/** Landau ladders, broadened density of states and Hall plateaus of one- and two-layer cones. */
export const landauLevels: ModelDefinition = {
  id: 'landau-levels',
  title: 'Landau levels',
  question: 'Which levels does a perpendicular magnetic field make, and what do they hold?',
  summary:
    'Massless, massive or two-layer cones in a field, with a crossed electric field, spin splitting and broadening.',
  parameters,
  numerics,
  results,
  certificate,
  checks,
  sliceCount,
  cost,
  assembleCost,
  sliceBytes,
  assembleBytes,
  resultBytes,
  notes,
  noteTexts,
  preview,
  examples,
  methods,
};
