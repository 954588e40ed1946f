import { formatNumber } from '@nightcone/drawing';
import { useState } from 'react';
import { Button } from '../components/button.tsx';
import type { ValueTable as Values } from './built-plot.ts';

const pageSize = 100;

/** The numbers behind a plot, a hundred rows at a time. */
export function ValueTable({ table, caption }: { table: Values; caption: string }) {
  const [page, setPage] = useState(0);
  const pages = Math.max(1, Math.ceil(table.rows / pageSize));
  const at = Math.min(page, pages - 1);
  const from = at * pageSize;
  const rows = Array.from({ length: Math.min(pageSize, table.rows - from) }, (_, i) => from + i);
  return (
    <div>
      {/* biome-ignore lint/a11y/noNoninteractiveTabindex: a scrolling region must be reachable by keys */}
      <section className="max-h-[55vh] overflow-auto" aria-label="Table of values" tabIndex={0}>
        <table className="w-full text-small">
          <caption className="sr-only">{caption}</caption>
          <thead>
            <tr className="border-rule border-b text-left">
              {table.columns.map((column) => (
                <th key={column.label} scope="col" className="sticky top-0 bg-ground py-1 pr-6 font-semibold">
                  {column.label}
                  {column.unit ? <span className="font-normal text-ink2"> ({column.unit})</span> : null}
                </th>
              ))}
            </tr>
          </thead>
          <tbody className="num">
            {rows.map((row) => (
              <tr key={row} className="border-hair border-b">
                {table.columns.map((column, index) => {
                  const value = table.cell(row, index);
                  return (
                    <td key={column.label} className="py-0.5 pr-6">
                      {typeof value === 'number' ? formatNumber(value, 9) : value}
                    </td>
                  );
                })}
              </tr>
            ))}
          </tbody>
        </table>
      </section>
      {pages > 1 ? (
        <p className="mt-3 flex items-center gap-4 text-small">
          <Button onClick={() => setPage(at - 1)} disabled={at === 0}>
            Before
          </Button>
          <span>
            Rows {from + 1} to {from + rows.length} of {table.rows}
          </span>
          <Button onClick={() => setPage(at + 1)} disabled={at === pages - 1}>
            After
          </Button>
        </p>
      ) : null}
    </div>
  );
}
