import type { ModelDefinition } from '../definition.ts';
import { numerics, parameters } from './continuum-ribbon/parameters.ts';
import { certificate, checks, results } from './continuum-ribbon/results.ts';

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
  sliceCount: 1,
  cost: 1,
  assembleCost: 1,
  sliceBytes: 65536,
  assembleBytes: 65536,
  resultBytes: 65536,
  notes: () => [],
  noteTexts: {},
  preview: [],
  examples: [],
  methods: { equations: '', numerics: '', validity: '', sources: [], pitfalls: [] },
};
