import { axisExtent } from '../../axis-extent.ts';
import type { AddNote, ValidityNote } from '../../definition.ts';
import type { SpecificationBody } from '../../expression.ts';
import { combinationNotes } from './combination-notes.ts';
import { type Choice, profileBound, ribbonWidthNm } from './geometry.ts';

/** ħ/e in T nm², from the exact SI values of h and e. */
const HBAR_OVER_E = 658.2119569509067;
/** Where the lattice's velocity differs by 1 % and 5 % from the cone's, for a hopping of 2.7 eV: 0.06 t and 0.3 t. */
const ONE_PERCENT_EV = 0.16;
const FIVE_PERCENT_EV = 0.8;
/** |𝒜| of 3 % and 20 % uniaxial strain: (3.37/2a₀)·ε with a₀ = 0.142 nm. */
const FIRST_ORDER_PER_NM = 0.356;
const ELASTIC_PER_NM = 2.373;
const PI = Math.PI;

/** Validity of a complete specification; + − × ÷ √ only. */
export function notes(body: SpecificationBody): ValidityNote[] {
  const found: ValidityNote[] = [];
  const add: AddNote = (code, severity, field, value, limit, unit) =>
    found.push({ code, severity, field, value, limit, unit });
  combinationNotes(body, add);
  energyNotes(body, add);
  fieldNotes(body, add);
  requestNotes(body, add);
  return found;
}

const size = (value: number) => (value < 0 ? -value : value);

/** Largest distance from 0 of the energies asked for: the window, or the ladder of subbands counted off at k. */
function energyReach({ parameters }: SpecificationBody): number {
  const spectrum = parameters.spectrum as Choice;
  if (spectrum.kind === 'window') return Math.max(size(Number(spectrum.eMin)), size(Number(spectrum.eMax)));
  const velocity = Number(parameters.diracVelocityEvNm);
  const perSide = Number(spectrum.count) / 2;
  const q = (PI * perSide) / chainLength(parameters);
  const k = axisExtent(parameters.kPerNm).largest;
  const field = Number(parameters.fieldT);
  // in a field k moves the orbit instead of raising its energy
  const along = field === 0 ? k : Math.max(0, k - (size(field) * ribbonWidthNm(parameters)) / (2 * HBAR_OVER_E));
  return size(Number(spectrum.energyEv)) + velocity * Math.sqrt(q * q + along * along);
}

const chainLength = (parameters: SpecificationBody['parameters']) =>
  ((parameters.edge as Choice).kind === 'armchair' ? 2 : 1) * ribbonWidthNm(parameters);

function energyNotes(body: SpecificationBody, add: AddNote): void {
  const { parameters, numerics } = body;
  const reach = energyReach(body);
  const place = '/parameters/spectrum';
  if (reach > FIVE_PERCENT_EV) add('cone-five-percent', 'caution', place, reach, FIVE_PERCENT_EV, 'eV');
  else if (reach > ONE_PERCENT_EV) add('cone-one-percent', 'note', place, reach, ONE_PERCENT_EV, 'eV');
  const grid = numerics.grid as Choice;
  const step = chainLength(parameters) / Number(grid.cells);
  // the wave is shortest where the potential is furthest from the energy
  const depth = reach + profileBound(parameters.potentialEv as Choice, ribbonWidthNm(parameters));
  const wavelength = (2 * PI * Number(parameters.diracVelocityEvNm)) / Math.max(depth, 1e-9);
  if (wavelength < 20 * step) add('grid-coarse', 'caution', '/numerics/grid', wavelength / step, 20, '');
  if (grid.kind === 'single') add('no-error-estimate', 'caution', '/numerics/grid', 1, 3, '');
  for (const name of ['potentialEv', 'massEv', 'valleyMassEv', 'gaugePerNm']) {
    const profile = parameters[name] as Choice;
    if (profile.kind === 'steps' && grid.kind === 'extrapolated')
      add('steps-converge-unevenly', 'note', `/parameters/${name}`, (profile.edges as []).length, 0, '');
  }
  const gauge = profileBound(parameters.gaugePerNm as Choice, ribbonWidthNm(parameters));
  if (gauge > ELASTIC_PER_NM)
    add('strain-past-limit', 'caution', '/parameters/gaugePerNm', gauge, ELASTIC_PER_NM, '1/nm');
  else if (gauge > FIRST_ORDER_PER_NM)
    add('strain-past-first-order', 'note', '/parameters/gaugePerNm', gauge, FIRST_ORDER_PER_NM, '1/nm');
}

function fieldNotes({ parameters, numerics }: SpecificationBody, add: AddNote): void {
  const width = ribbonWidthNm(parameters);
  const bond = Number(parameters.bondLengthNm);
  if (width < 10 * bond) add('width-near-bonds', 'caution', '/parameters/width', width, 10 * bond, 'nm');
  const field = size(Number(parameters.fieldT));
  if (field > 0) {
    const length = Math.sqrt(HBAR_OVER_E / field);
    const refined = (numerics.grid as Choice).kind === 'extrapolated' ? 4 : 1;
    const step = chainLength(parameters) / (refined * Number((numerics.grid as Choice).cells));
    if (length < 10 * bond) add('length-near-bonds', 'caution', '/parameters/fieldT', length, 10 * bond, 'nm');
    if (length < 8 * step) add('length-near-step', 'caution', '/numerics/grid', length, 8 * step, 'nm');
    if (width < 4 * length) add('no-room-for-orbits', 'note', '/parameters/fieldT', width, 4 * length, 'nm');
  }
  const edge = parameters.edge as Choice;
  const rule = parameters.width as Choice;
  if (edge.kind === 'armchair' && rule.kind === 'dimer-lines') {
    const gap = (2 * PI * Number(parameters.diracVelocityEvNm)) / (3 * width);
    const metallic = (Number(rule.count) + 1) % 3 === 0;
    if (metallic) add('family-metallic', 'note', '/parameters/width', Number(rule.count), 0, '');
    else add('family-gapped', 'note', '/parameters/width', gap, 0, 'eV');
  }
  if (edge.kind === 'infinite-mass' && Number(edge.lowerSign) * Number(edge.upperSign) === -1)
    add('one-way-mode', 'note', '/parameters/edge', 1, 0, '');
}

function requestNotes({ parameters }: SpecificationBody, add: AddNote): void {
  const k = parameters.kPerNm as Choice | number;
  const place = '/parameters/kPerNm';
  if (typeof k === 'number') add('no-gap-from-one-k', 'note', place, 1, 3, '');
  else if (k.kind === 'range' && Number(k.start) === -Number(k.stop) && Number(k.count) % 2 === 0)
    add('zero-not-on-axis', 'note', place, Number(k.count), Number(k.count) + 1, '');
  else if (k.kind === 'values' && !increases(k.values as number[]))
    add('axis-not-increasing', 'caution', place, 0, 0, '');
  const spectrum = parameters.spectrum as Choice;
  if (spectrum.kind !== 'window') return;
  const asked = axisExtent(parameters.energyEv);
  const eMin = Number(spectrum.eMin);
  const eMax = Number(spectrum.eMax);
  if (asked.most >= eMax) add('channels-outside-window', 'note', '/parameters/energyEv', asked.most, eMax, 'eV');
  else if (asked.least <= eMin) add('channels-outside-window', 'note', '/parameters/energyEv', asked.least, eMin, 'eV');
}

const increases = (values: number[]) => values.every((value, i) => i === 0 || value > (values[i - 1] as number));
