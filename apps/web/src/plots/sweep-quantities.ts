import { findModel, type Json } from '@nightcone/models';
import { axisValues, type Body, kindOf } from './result-data.ts';

export interface SweepQuantity {
  array: string;
  label: string;
  symbol: string;
  unit: string;
  /** Leading dims of the array, from which a reader chooses one row; none: one value or one short list. */
  dims: RowDim[];
}
export interface RowDim {
  label: string;
  texts: string[];
  /** Shown first: the first valley or spin, the middle of an axis. */
  first: number;
}

const text = (value: number) => String(Number(value.toPrecision(6))).replace('-', '−');
const axisOfDim: Record<string, string> = {
  k: 'kPerNm',
  field: 'fieldT',
  energy: 'energyEv',
  carrier: 'carrierPerNm2',
};

/** What stands at each place of a leading dim, counted from the specification's own axes. */
function rowDim(body: Body, dim: string): RowDim {
  if (dim === 'valley') {
    const armchair = kindOf(body.parameters.edge) === 'armchair';
    const chosen = body.parameters.valleys;
    const texts = armchair ? ['both'] : chosen === 'both' ? ['K', 'K′'] : [chosen === 'K-prime' ? 'K′' : 'K'];
    return { label: 'valley', texts, first: 0 };
  }
  if (dim === 'spin')
    return { label: 'spin', texts: kindOf(body.parameters.spin) === 'zeeman' ? ['up', 'down'] : ['both'], first: 0 };
  const axis = axisOfDim[dim];
  const values = axisValues(axis ? (body.parameters[axis] as Json | undefined) : undefined);
  return {
    label: dim,
    texts: values.length > 0 ? values.map(text) : ['all'],
    first: Math.floor((values.length - 1) / 2),
  };
}

/** Row of an array at these places of its leading dims: the last dim runs fastest. */
export const rowAt = (dims: readonly RowDim[], places: readonly number[]): number =>
  dims.reduce((row, dim, i) => row * dim.texts.length + (places[i] ?? dim.first), 0);

/** The quantity people look for first, then single values, then the rest in the order of the definition. */
const first = ['gapEv', 'energies'];
const rank = ({ array, single }: { array: string; single: boolean }): number =>
  first.includes(array) ? first.indexOf(array) : single ? 10 : 20;

/** What can be drawn against a swept parameter: single values first, then rows of lists. */
export function sweepQuantities(modelId: string, body: Body): SweepQuantity[] {
  const model = findModel(modelId);
  if (!model) return [];
  const inputs = new Set(model.parameters.map(({ name }) => name));
  const wanted = model.results.filter((result) => result.dtype === 'f64' && !inputs.has(result.name));
  const quantities = wanted.map((result) => {
    const lead = result.ragged ? result.dims.slice(0, 2) : result.dims.slice(0, -1);
    return {
      array: result.name,
      label: result.display?.title ?? result.name,
      symbol: result.display?.symbol ?? `\\text{${result.name}}`,
      unit: result.unit,
      dims: lead.map((dim) => rowDim(body, dim)),
      single: result.dims.length === 0,
    };
  });
  return quantities.sort((a, b) => rank(a) - rank(b)).map(({ single: _, ...quantity }) => quantity);
}
