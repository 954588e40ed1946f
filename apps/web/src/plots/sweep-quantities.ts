import { findModel, type Json } from '@nightcone/models';
import { axisValues, type Body, kindOf } from './result-data.ts';

export interface SweepQuantity {
  array: string;
  label: string;
  symbol: string;
  unit: string;
  /** Number of rows to choose from; 0: the array is one value. */
  rows: number;
  /** What a row is, in words. */
  rowLabel(row: number): string;
}

const text = (value: number) => String(Number(value.toPrecision(6))).replace('-', '−');

/** The rows of the first dims of an array, counted from the specification's own axes. */
function rowsOf(body: Body, dims: readonly string[], ragged: boolean): { count: number; label(row: number): string } {
  const lead = ragged ? dims.slice(0, 2) : dims.slice(0, -1);
  const names: { label: string; texts: string[] }[] = lead.map((dim) => {
    if (dim === 'valley') {
      const both = body.parameters.valleys === 'both' && kindOf(body.parameters.edge) !== 'armchair';
      const first = body.parameters.valleys === 'K-prime' ? 'K′' : 'K';
      const texts = kindOf(body.parameters.edge) === 'armchair' ? ['both'] : both ? ['K', 'K′'] : [first];
      return { label: 'valley', texts };
    }
    if (dim === 'spin')
      return { label: 'spin', texts: kindOf(body.parameters.spin) === 'zeeman' ? ['up', 'down'] : ['both'] };
    const axis = { k: 'kPerNm', field: 'fieldT', energy: 'energyEv', carrier: 'carrierPerNm2' }[dim];
    const values = axisValues(axis ? (body.parameters[axis] as Json | undefined) : undefined);
    return { label: dim, texts: values.map(text) };
  });
  const lengths = names.map((name) => Math.max(1, name.texts.length));
  return {
    count: lengths.reduce((product, length) => product * length, 1),
    label(row) {
      let rest = row;
      const parts: string[] = [];
      for (let i = names.length - 1; i >= 0; i--) {
        const length = lengths[i] as number;
        const value = names[i]?.texts[rest % length];
        rest = Math.floor(rest / length);
        if (value !== undefined)
          if (length > 1 || names[i]?.label === 'valley')
            parts.unshift(
              `${names[i]?.label}${Number.isNaN(Number.parseFloat(value.replace('−', '-'))) ? '' : ' ='} ${value}`,
            );
      }
      return parts.join(', ');
    },
  };
}

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
    const rows = rowsOf(body, result.dims, result.ragged !== undefined);
    const single = result.dims.length === 0;
    return {
      array: result.name,
      label: result.display?.title ?? result.name,
      symbol: result.display?.symbol ?? `\\text{${result.name}}`,
      unit: result.unit,
      rows: single || (result.dims.length === 1 && !result.ragged) ? 0 : rows.count,
      rowLabel: rows.label,
      single,
    };
  });
  return quantities.sort((a, b) => rank(a) - rank(b)).map(({ single: _, ...quantity }) => quantity);
}

/** The row a reader asks for first: the middle of the axis, in the first valley. */
export const middleRow = (quantity: SweepQuantity): number =>
  Math.floor(quantity.rows / 2 - (quantity.rows % 2 === 0 ? 0 : 0.5));
