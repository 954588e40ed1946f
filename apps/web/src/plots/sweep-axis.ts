import type { Sweep } from '@nightcone/contracts';
import { type Field, findModel, type Json, pointerTokens, typeAt } from '@nightcone/models';
import type { Body } from './result-data.ts';

/** One swept axis in numbers: what it varies, and where each of its values stands on a drawing. */
export interface DrawnAxis {
  label: string;
  symbol: string;
  unit: string;
  places: number[];
  /** Value as it reads in words. */
  texts: string[];
  /** Values are not numbers: places are their order. */
  ordered: boolean;
}

/** The field that a pointer of a sweep stands for, following the kinds of the base specification and of the values. */
export function fieldOfPointer(modelId: string, body: Body, pointer: string): Field | undefined {
  const model = findModel(modelId);
  if (!model) return undefined;
  const tokens = pointerTokens(pointer);
  const found = typeAt(model.parameters, body.parameters, tokens) ?? typeAt(model.numerics, body.numerics, tokens);
  return found as Field | undefined;
}

const textOf = (value: Json): string =>
  typeof value === 'object' && value !== null && !Array.isArray(value) && typeof value.kind === 'string'
    ? value.kind
    : typeof value === 'string'
      ? value
      : JSON.stringify(value);

/** The first pointer of the axis speaks for all that vary with it. */
export function drawnAxis(sweep: Pick<Sweep, 'model' | 'specification'>, axis: Sweep['axes'][number]): DrawnAxis {
  const pointer = axis.pointers[0] ?? '';
  const field = fieldOfPointer(sweep.model, sweep.specification as unknown as Body, pointer);
  const values = axis.values.map((each) => (each[0] ?? null) as Json);
  const ordered = !values.every((value) => typeof value === 'number');
  const name = pointer.split('/').at(-1) ?? pointer;
  return {
    label: field?.display?.title ?? name,
    symbol: field?.display?.symbol ?? `\\text{${name}}`,
    unit: !ordered && field && 'unit' in field ? field.unit : '',
    places: values.map((value, i) => (ordered ? i + 1 : (value as number))),
    texts: values.map(textOf),
    ordered,
  };
}

/** Place of a point on every axis: row-major, the last axis runs fastest. */
export function axisIndices(index: number, lengths: readonly number[]): number[] {
  const indices: number[] = [];
  let rest = index;
  for (const length of lengths.toReversed()) {
    indices.unshift(rest % length);
    rest = Math.floor(rest / length);
  }
  return indices;
}
