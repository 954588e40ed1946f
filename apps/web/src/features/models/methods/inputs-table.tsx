import type { Field } from '@nightcone/models';
import { SymbolText } from '../../../plots/symbol-text.tsx';
import { ScrollRegion } from './scroll-region.tsx';

interface Row {
  name: string;
  field: Field;
  depth: number;
  /** Kind of the choice above that has this member. */
  kind: string | null;
}

/** Every input with its unit, default and range, straight from the definition. */
export function InputsTable({ fields, caption }: { fields: readonly Field[]; caption: string }) {
  return (
    <ScrollRegion label={`Table of ${caption.toLowerCase()}`}>
      <table className="mt-2 w-full min-w-[44rem] text-small">
        <caption className="sr-only">{caption}</caption>
        <thead>
          <tr className="border-rule border-b text-left align-bottom">
            <th scope="col" className="py-1 pr-3 font-semibold">
              symbol
            </th>
            <th scope="col" className="py-1 pr-4 font-semibold">
              name
            </th>
            <th scope="col" className="py-1 pr-4 font-semibold">
              unit
            </th>
            <th scope="col" className="py-1 pr-4 font-semibold">
              default
            </th>
            <th scope="col" className="py-1 pr-4 font-semibold">
              range
            </th>
            <th scope="col" className="py-1 font-semibold">
              what it is
            </th>
          </tr>
        </thead>
        <tbody>
          {rowsOf(fields, 0, null, '').map((row) => (
            <tr key={row.name} className="border-hair border-b align-baseline">
              <td className="py-1 pr-3">
                {row.field.display?.symbol ? <SymbolText tex={row.field.display.symbol} /> : null}
              </td>
              <th scope="row" className="py-1 pr-4 text-left font-normal" style={{ paddingLeft: row.depth * 14 }}>
                <code>{row.field.name}</code>
                {row.kind ? <span className="block text-ink3 text-least">{row.kind}</span> : null}
              </th>
              <td className="num py-1 pr-4">{'unit' in row.field ? row.field.unit : ''}</td>
              <td className="num py-1 pr-4">{defaultText(row.field)}</td>
              <td className="num py-1 pr-4 whitespace-nowrap">{rangeText(row.field)}</td>
              <td className="py-1">{row.field.display?.help}</td>
            </tr>
          ))}
        </tbody>
      </table>
    </ScrollRegion>
  );
}

function rowsOf(fields: readonly Field[], depth: number, kind: string | null, prefix: string): Row[] {
  return fields.flatMap((field): Row[] => {
    const name = `${prefix}/${kind ?? ''}/${field.name}`;
    const own: Row = { name, field, depth, kind };
    if (field.type === 'choice')
      return [own, ...field.kinds.flatMap((each) => rowsOf(each.members, depth + 1, each.kind, name))];
    if (field.type === 'group') return [own, ...rowsOf(field.members, depth + 1, null, name)];
    return [own];
  });
}

function defaultText(field: Field): string {
  const value = field.default;
  if (value === undefined) return '';
  if (typeof value !== 'object' || value === null) return String(value);
  if (Array.isArray(value)) return value.length === 0 ? 'none' : value.join(', ');
  if (value.kind === 'range') return `${value.start}..${value.stop} / ${value.count}`;
  return String(value.kind ?? '');
}

function rangeText(field: Field): string {
  switch (field.type) {
    case 'number':
      return `${field.exclusiveMin ? 'above ' : ''}${field.min} … ${field.max}`;
    case 'integer':
    case 'axis':
    case 'auto-number':
      return `${field.min} … ${field.max}`;
    case 'enum':
      return field.values.join(', ');
    case 'choice':
      return field.kinds.map(({ kind }) => kind).join(', ');
    case 'list':
      return `${field.minItems} … ${field.maxItems} items`;
    default:
      return '';
  }
}
