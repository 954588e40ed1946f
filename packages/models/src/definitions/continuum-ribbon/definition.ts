import type { ModelDefinition } from '../../definition.ts';
import { examples, preview } from './examples.ts';
import { methods } from './methods.ts';
import { noteTexts } from './note-texts.ts';
import { notes } from './notes.ts';
import { numerics, parameters } from './parameters.ts';
import { certificate, checks, results } from './results.ts';
import { assembleBytes, assembleCost, cost, resultBytes, sliceBytes, sliceCount } from './size.ts';

/** Subbands of a Dirac ribbon with edges, field, potential, mass and strain. */
export const continuumRibbon: ModelDefinition = {
  id: 'continuum-ribbon',
  title: 'Continuum ribbon',
  question: 'Which subbands does a strip have, with its edges, a field, a potential, a mass or strain?',
  summary: 'The Dirac equation across a strip: zigzag, armchair, infinite-mass or periodic edges.',
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
