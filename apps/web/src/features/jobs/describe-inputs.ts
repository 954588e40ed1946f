import type { Field, Json, ModelDefinition, SpecificationBody } from '@nightcone/models';
import { formatNumber, formatQuantity } from '../../lib/format-quantity.ts';

export interface InputRow {
  /** JSON Pointer: the row's identity. */
  pointer: string;
  symbol?: string | undefined;
  name: string;
  value: string;
  /** Equals the model's default. */
  isDefault: boolean;
}

/** The inputs of a job as rows, in the order of the model's definition; members of a choice follow it. */
export function describeInputs(model: ModelDefinition, body: SpecificationBody): InputRow[] {
  return [
    ...model.parameters.flatMap((field) => describe(field, body.parameters[field.name], `/parameters/${field.name}`)),
    ...model.numerics.flatMap((field) => describe(field, body.numerics[field.name], `/numerics/${field.name}`)),
  ];
}

function describe(field: Field, value: Json | undefined, pointer: string): InputRow[] {
  if (value === undefined) return [];
  const row = (text: string): InputRow => ({
    pointer,
    symbol: field.display?.symbol,
    name: field.display?.title ?? field.name,
    value: text,
    isDefault: field.default !== undefined && sameValue(value, field.default),
  });
  if (field.type === 'choice' && isObject(value)) {
    const chosen = field.kinds.find(({ kind }) => kind === value.kind);
    const members = chosen?.members ?? [];
    return [
      row(chosen?.display?.title ?? String(value.kind)),
      ...members.flatMap((member) => describe(member, value[member.name], `${pointer}/${member.name}`)),
    ];
  }
  if (field.type === 'group' && isObject(value)) {
    return field.members.flatMap((member) => describe(member, value[member.name], `${pointer}/${member.name}`));
  }
  return [row(valueText(field, value))];
}

/** One value in words: `0.142 nm`, `0 … 20 T / 201`, `K, K′`. */
export function valueText(field: Pick<Field, 'type'> & { unit?: string }, value: Json): string {
  const unit = field.unit ?? '';
  if (typeof value === 'number') return formatQuantity(value, unit, 12);
  if (value === null) return 'none';
  if (typeof value === 'boolean') return value ? 'yes' : 'no';
  if (typeof value === 'string') return value.length === 64 ? value.slice(0, 12) : (valleyNames[value] ?? value);
  if (Array.isArray(value)) return listText(value, unit);
  if (value.kind === 'auto') return 'auto';
  if (value.kind === 'range') {
    const [start, stop] = [Number(value.start), Number(value.stop)];
    return `${formatNumber(start, 12)} … ${formatNumber(stop, 12)}${unit && ` ${unit}`} / ${value.count}`;
  }
  if (value.kind === 'values' && Array.isArray(value.values)) return listText(value.values, unit);
  if (value.kind === 'whole-zone') return `whole zone / ${value.count}`;
  return typeof value.kind === 'string' ? value.kind : JSON.stringify(value);
}

const valleyNames: Record<string, string> = { K: 'K', 'K-prime': 'K′', both: 'K and K′' };
const most = 6;

function listText(values: readonly Json[], unit: string): string {
  const shown = values.slice(0, most).map((each) => (typeof each === 'number' ? formatNumber(each, 8) : String(each)));
  const text = values.length > most ? `${shown.join(', ')}, … (${values.length})` : shown.join(', ');
  return unit ? `${text} ${unit}` : text;
}

const isObject = (value: Json): value is { [key: string]: Json } =>
  typeof value === 'object' && value !== null && !Array.isArray(value);

/** Equal as JSON, whatever the order of names. */
function sameValue(a: Json, b: Json): boolean {
  if (Array.isArray(a) || Array.isArray(b)) {
    return (
      Array.isArray(a) &&
      Array.isArray(b) &&
      a.length === b.length &&
      a.every((each, i) => sameValue(each, b[i] ?? null))
    );
  }
  if (isObject(a) && isObject(b)) {
    const names = new Set([...Object.keys(a), ...Object.keys(b)]);
    return [...names].every((name) => sameValue(a[name] ?? null, b[name] ?? null));
  }
  return a === b;
}
