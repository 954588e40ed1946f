import type { Sweep, SweepPoint } from '@nightcone/contracts';
import { findModel, type Json, pointerTokens, type SpecificationBody, typeAt } from '@nightcone/models';
import { formatQuantity } from '../../lib/format-quantity.ts';

export interface AxisName {
  pointer: string;
  /** TeX, when the definition has one. */
  symbol?: string | undefined;
  title: string;
  unit: string;
}

/** What a swept pointer is called, from the model's definition; its last word where nothing is known. */
export function axisNames(sweep: Pick<Sweep, 'axes' | 'model' | 'specification'>): AxisName[] {
  const model = findModel(sweep.model);
  const body = sweep.specification as unknown as SpecificationBody;
  return sweep.axes.flatMap(({ pointers }) =>
    pointers.map((pointer): AxisName => {
      const tokens = pointerTokens(pointer);
      const type =
        model && (typeAt(model.parameters, body.parameters, tokens) ?? typeAt(model.numerics, body.numerics, tokens));
      const display = type && 'display' in type ? (type.display as { symbol?: string; title: string }) : undefined;
      return {
        pointer,
        symbol: display?.symbol,
        title: display?.title ?? tokens.at(-1) ?? pointer,
        unit: type && 'unit' in type ? type.unit : '',
      };
    }),
  );
}

/** `B = 12 T, N = 40` */
export function pointWords(names: readonly AxisName[], values: SweepPoint['values']): string {
  return names.map((name, index) => `${name.title} ${valueWords(values[index] ?? null, name.unit)}`).join(', ');
}

export function valueWords(value: Json, unit: string): string {
  if (typeof value === 'number') return formatQuantity(value, unit, 8);
  if (typeof value === 'string') return value;
  if (typeof value === 'object' && value !== null && 'kind' in value) return String(value.kind);
  return JSON.stringify(value);
}
