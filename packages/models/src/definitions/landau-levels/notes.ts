import { axisExtent } from '../../axis-extent.ts';
import type { AddNote, ValidityNote } from '../../definition.ts';
import type { SpecificationBody } from '../../expression.ts';
import type { Json } from '../../fields.ts';

/** ħ/e and h/e in T nm², from the exact SI values of h and e. */
const HBAR_OVER_E = 658.2119569509067;
const FLUX_QUANTUM = 4135.667696923859;
/** Where the lattice's velocity differs by 1 % and 5 % from the cone's, for a hopping of 2.7 eV: 0.06 t and 0.3 t. */
const ONE_PERCENT_EV = 0.16;
const FIVE_PERCENT_EV = 0.8;
/** Ten bonds of 0.142 nm: below it the wave function sees single atoms. */
const TEN_BONDS_NM = 1.42;

type Choice = { kind: string; [member: string]: Json };

/** Everything the notes look at, as numbers. */
function quantities({ parameters, numerics }: SpecificationBody) {
  const system = parameters.system as Choice;
  const field = axisExtent(parameters.fieldT);
  const velocity = Number(parameters.diracVelocityEvNm);
  const levels = Number(parameters.levels);
  const square = (2 * velocity * velocity * field.largest) / HBAR_OVER_E;
  const number = (name: string) => Number(system[name] ?? 0);
  const mass = number('massEv');
  const states = (parameters.valleys === 'both' ? 2 : 1) * statesOfSpin(parameters.spin as Choice);
  return {
    system,
    number,
    field,
    velocity,
    levels,
    /** (√2 ħv/l)² in the largest field. */
    square,
    /** Bound of the listed levels of one layer in the largest field. */
    top: Math.sqrt(mass * mass + square * levels),
    states,
    energy: axisExtent(parameters.energyEv),
    carrier: axisExtent(parameters.carrierPerNm2),
    broadening: parameters.broadening as Choice,
    method: numerics.method as Choice,
  };
}

const statesOfSpin = (spin: Choice) => (spin.kind === 'zeeman' ? 2 : Number(spin.factor));

/** Validity of a complete specification; + − × ÷ √ only. */
export function notes(body: SpecificationBody): ValidityNote[] {
  const found: ValidityNote[] = [];
  const q = quantities(body);
  const add = (
    code: string,
    severity: ValidityNote['severity'],
    field: string,
    value: number,
    limit: number,
    unit: string,
  ) => found.push({ code, severity, field, value, limit, unit });

  methodNotes(q, add);
  crossedFieldNotes(q, add);
  if (q.field.largest === 0) add('no-field', 'caution', '/parameters/fieldT', 0, 0, 'T');

  if (q.system.kind === 'monolayer' && q.field.largest > 0) {
    if (q.top > FIVE_PERCENT_EV)
      add('cone-five-percent', 'caution', '/parameters/levels', q.top, FIVE_PERCENT_EV, 'eV');
    else if (q.top > ONE_PERCENT_EV) add('cone-one-percent', 'note', '/parameters/levels', q.top, ONE_PERCENT_EV, 'eV');
    if (q.broadening.kind !== 'none' && q.energy.largest > q.top) {
      add('energies-beyond-levels', 'note', '/parameters/energyEv', q.energy.largest, q.top, 'eV');
    }
  }
  if (q.field.largest > 0) {
    const length = Math.sqrt(HBAR_OVER_E / q.field.largest);
    if (length < TEN_BONDS_NM) add('length-near-bonds', 'caution', '/parameters/fieldT', length, TEN_BONDS_NM, 'nm');
    const capacity = (q.states * q.field.largest * (q.levels + 0.5)) / FLUX_QUANTUM;
    if (q.carrier.largest > capacity) {
      add('carriers-beyond-levels', 'caution', '/parameters/carrierPerNm2', q.carrier.largest, capacity, '1/nm²');
    }
    const width = Number(q.broadening.hwhmEv ?? q.broadening.sigmaEv ?? 0);
    const first = Math.sqrt(q.square);
    if (width > first) add('lines-overlap', 'note', '/parameters/broadening', width, first, 'eV');
  }
  return found;
}

type Quantities = ReturnType<typeof quantities>;

/** Collapse of the ladder at |F| = v|B|. */
function crossedFieldNotes({ number, velocity, field }: Quantities, add: AddNote): void {
  const force = number('electricFieldEvPerNm');
  if (force === 0) return;
  const needed = ((force < 0 ? -force : force) * HBAR_OVER_E) / velocity;
  const place = '/parameters/system/electricFieldEvPerNm';
  if (field.largest <= needed) add('collapsed-everywhere', 'caution', place, field.largest, needed, 'T');
  else if (field.smallest <= needed) add('collapsed-below', 'note', place, field.smallest, needed, 'T');
}

/** Methods that do not exist for the system, and sizes that cannot hold the levels. */
function methodNotes({ system, number, method, levels, square }: Quantities, add: AddNote): void {
  const place = '/numerics/method';
  const isBilayer = system.kind === 'bilayer';
  if (method.kind === 'closed-form' && number('v3Ratio') !== 0)
    add('no-closed-form', 'refuse', place, number('v3Ratio'), 0, '');
  if (method.kind === 'ladder') {
    const size = Number(method.size);
    if (number('electricFieldEvPerNm') !== 0) {
      add('no-crossed-ladder', 'refuse', place, number('electricFieldEvPerNm'), 0, 'eV/nm');
    }
    if (size < levels + 2) add('ladder-too-short', 'refuse', `${place}/size`, size, levels + 2, '');
    else if (number('v3Ratio') !== 0 && square > 0) {
      // the ladder must outgrow the energy γ₁(v₃/v)², in units of the level scale
      const ratio = (number('v3Ratio') * number('gamma1Ev')) / Math.sqrt(square);
      const wanted = 2 * levels + 24 + 8 * ratio * ratio;
      if (size < wanted) add('ladder-short', 'caution', `${place}/size`, size, wanted, '');
    }
  }
  if (method.kind === 'grid') {
    if (isBilayer) add('no-bilayer-grid', 'refuse', place, 2, 1, '');
    const box = Number(method.boxMagneticLengths);
    const wanted = Math.sqrt(2 * levels) + 3;
    if (box < wanted) add('box-too-small', 'refuse', `${place}/boxMagneticLengths`, box, wanted, '');
    const cells = Number(method.cellsPerMagneticLength);
    // cells per wavelength of the highest level, 2π l/√(2n), on the finest grid
    const perWave = levels > 0 ? (6.283185307179586 * cells) / Math.sqrt(2 * levels) : cells;
    if (perWave < 20) add('grid-coarse', 'caution', `${place}/cellsPerMagneticLength`, perWave, 20, '');
  }
}

export const noteTexts: { [code: string]: string } = {
  'no-field': 'Without a field there are no Landau levels: every entry would be empty.',
  'cone-one-percent':
    'The highest level reaches {value}. Above {limit} a honeycomb with t = 2.7 eV differs from the cone by more than 1 %.',
  'cone-five-percent':
    'The highest level reaches {value}. Above {limit} a honeycomb with t = 2.7 eV differs from the cone by more than 5 %.',
  'energies-beyond-levels':
    'Even in the highest field the listed levels end at {limit}, and the density is asked for up to {value}: it lacks the levels above.',
  'length-near-bonds':
    'The magnetic length falls to {value}, under ten bond lengths ({limit}): the continuum no longer holds.',
  'carriers-beyond-levels':
    'The listed levels hold {limit} in the highest field; at {value} the Fermi energy lies above them and is left empty.',
  'lines-overlap':
    'The line width {value} exceeds the first level {limit} even in the highest field: no line stands alone.',
  'collapsed-everywhere':
    'The crossed field collapses the ladder below {limit}, and the field is at most {value}: there are no discrete levels.',
  'collapsed-below': 'Below {limit} the crossed field has collapsed the ladder; those fields stay empty.',
  'no-closed-form': 'Two layers with v₃ have no closed form; take the ladder, or automatic.',
  'no-crossed-ladder': 'The ladder cannot hold a crossed field; take the closed form or the grid.',
  'ladder-too-short': 'The ladder has {value} states and needs {limit} for the levels asked for.',
  'ladder-short':
    'The ladder has {value} states; with v₃ in this field it converges from about {limit}. The error of each level is returned.',
  'no-bilayer-grid': 'The grid is for one layer; take the closed form or the ladder.',
  'box-too-small': 'The half box is {value} magnetic lengths; the highest level needs {limit}.',
  'grid-coarse': 'The finest grid has {value} cells per wavelength of the highest level; take at least {limit}.',
};
