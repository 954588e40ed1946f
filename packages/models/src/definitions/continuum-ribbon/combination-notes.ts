import type { AddNote } from '../../definition.ts';
import { axisCount } from '../../evaluate-expression.ts';
import type { SpecificationBody } from '../../expression.ts';
import { type Choice, profileIntegral, ribbonWidthNm } from './geometry.ts';

/** Combinations that the kernel refuses, said before anything is submitted. */
export function combinationNotes(body: SpecificationBody, add: AddNote): void {
  edgeNotes(body, add);
  requestNotes(body, add);
}

function edgeNotes({ parameters, numerics }: SpecificationBody, add: AddNote): void {
  const edge = parameters.edge as Choice;
  const width = parameters.width as Choice;
  const cells = Number((numerics.grid as Choice).cells);
  if (edge.kind === 'infinite-mass') {
    for (const sign of ['lowerSign', 'upperSign'])
      if (Number(edge[sign]) === 0) add('sign-zero', 'refuse', `/parameters/edge/${sign}`, 0, 1, '');
  }
  if (width.kind === 'dimer-lines' && edge.kind !== 'armchair')
    add('dimer-lines-need-armchair', 'refuse', '/parameters/width', Number(width.count), 0, '');
  if (width.kind === 'zigzag-chains' && edge.kind !== 'zigzag')
    add('chains-need-zigzag', 'refuse', '/parameters/width', Number(width.count), 0, '');
  if (edge.kind === 'armchair') {
    if (parameters.valleys !== 'both') add('armchair-mixes-valleys', 'refuse', '/parameters/valleys', 1, 2, '');
    if (cells % 2 !== 0) add('armchair-needs-even-cells', 'refuse', '/numerics/grid', cells, cells + 1, '');
  }
  if (edge.kind === 'periodic') {
    const widthNm = ribbonWidthNm(parameters);
    const flux = profileIntegral(parameters.fieldProfileT as Choice, widthNm);
    const uniform = Number(parameters.fieldT);
    if (flux === undefined) return;
    const mean = uniform + flux / widthNm;
    const scale = 1e-9 * Math.max(uniform < 0 ? -uniform : uniform, mean < 0 ? -mean : mean);
    if ((mean < 0 ? -mean : mean) > scale) add('field-must-average', 'refuse', '/parameters/fieldT', mean, 0, 'T');
  }
}

function requestNotes({ parameters, numerics }: SpecificationBody, add: AddNote): void {
  const edge = parameters.edge as Choice;
  const spectrum = parameters.spectrum as Choice;
  const cells = Number((numerics.grid as Choice).cells);
  const isDomain = edge.kind === 'infinite-mass' && Number(edge.lowerSign) !== Number(edge.upperSign);
  const most = 2 * cells - 6 - (isDomain ? 1 : 0);
  if (spectrum.kind === 'window' && Number(spectrum.eMin) >= Number(spectrum.eMax))
    add('window-empty', 'refuse', '/parameters/spectrum', Number(spectrum.eMin), Number(spectrum.eMax), 'eV');
  if (spectrum.kind === 'nearest' && Number(spectrum.count) > most)
    add('count-beyond-grid', 'refuse', '/parameters/spectrum/count', Number(spectrum.count), most, '');
  const points = axisCount(parameters.kPerNm);
  const states = numerics.states as number[];
  for (const [i, state] of states.entries()) {
    if (state >= points) add('state-beyond-axis', 'refuse', `/numerics/states/${i}`, state, points - 1, '');
    else if (i > 0 && state <= (states[i - 1] as number))
      add('states-must-increase', 'refuse', `/numerics/states/${i}`, state, (states[i - 1] as number) + 1, '');
  }
}
