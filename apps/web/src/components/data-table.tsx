import {
  type ColumnDef,
  rowSortingFeature,
  type SortingState,
  type TableFeatures,
  tableFeatures,
  useTable,
} from '@tanstack/react-table';
import type { KeyboardEvent } from 'react';

/** Sorting and pages happen on the server: the table only says what is asked for. */
export const serverTable = tableFeatures({ rowSortingFeature });
export type ServerTable = typeof serverTable & TableFeatures;
const none: never[] = [];

export interface Sort {
  id: string;
  direction: 'ascending' | 'descending';
}

/**
 * Table of links. Arrow keys, Home and End move between the rows' links (`data-row`), Enter opens one. Columns whose
 * meta says `wide` are left out on narrow screens.
 */
export function DataTable<Row extends object>({
  caption,
  columns,
  rows,
  rowId,
  sort,
  onSort,
  busy = false,
}: {
  caption: string;
  columns: ColumnDef<ServerTable, Row, never>[];
  rows: readonly Row[];
  rowId: (row: Row) => string;
  sort?: Sort;
  onSort?: (sort: Sort) => void;
  busy?: boolean;
}) {
  const sorting: SortingState = sort ? [{ id: sort.id, desc: sort.direction === 'descending' }] : none;
  const table = useTable({
    features: serverTable,
    columns: columns as never,
    data: rows as Row[] as never[],
    getRowId: rowId as never,
    state: { sorting },
    onSortingChange: (update) => {
      const [next] = typeof update === 'function' ? update(sorting) : update;
      if (next) onSort?.({ id: next.id, direction: next.desc ? 'descending' : 'ascending' });
    },
    manualSorting: true,
    enableSortingRemoval: false,
  });
  return (
    <table aria-busy={busy || undefined} className="w-full border-collapse text-small">
      <caption className="sr-only">{caption}</caption>
      <thead>
        {table.getHeaderGroups().map((group) => (
          <tr key={group.id} className="border-hair border-b text-ink2">
            {group.headers.map((header) => {
              const sorted = header.column.getIsSorted();
              const canSort = onSort !== undefined && header.column.getCanSort();
              return (
                <th
                  key={header.id}
                  scope="col"
                  aria-sort={sorted ? (sorted === 'asc' ? 'ascending' : 'descending') : undefined}
                  className={`py-1.5 pr-5 text-left font-normal last:pr-0 ${cellClass(header.column.columnDef.meta)}`}
                >
                  {canSort ? (
                    <button
                      type="button"
                      onClick={header.column.getToggleSortingHandler()}
                      className={`inline-flex min-h-6 cursor-pointer items-center gap-1.5 hover:text-ink ${(header.column.columnDef.meta as ColumnMeta | undefined)?.right ? 'flex-row-reverse' : ''}`}
                    >
                      <table.FlexRender header={header} />
                      <span aria-hidden className="w-2 text-least">
                        {sorted === 'asc' ? '↑' : sorted === 'desc' ? '↓' : ''}
                      </span>
                    </button>
                  ) : (
                    <table.FlexRender header={header} />
                  )}
                </th>
              );
            })}
          </tr>
        ))}
      </thead>
      <tbody onKeyDown={moveBetweenRows}>
        {table.getRowModel().rows.map((row) => (
          <tr key={row.id} className="border-hair border-b focus-within:bg-field hover:bg-field">
            {row.getAllCells().map((cell) => (
              <td
                key={cell.id}
                className={`py-[7px] pr-5 align-baseline last:pr-0 ${cellClass(cell.column.columnDef.meta)}`}
              >
                <table.FlexRender cell={cell} />
              </td>
            ))}
          </tr>
        ))}
      </tbody>
    </table>
  );
}

/** Column meta: `wide` columns need room, numbers stand at the right. */
export interface ColumnMeta {
  wide?: boolean;
  right?: boolean;
}
const cellClass = (meta: unknown): string => {
  const { wide, right } = (meta ?? {}) as ColumnMeta;
  return `${wide ? 'max-md:hidden' : ''} ${right ? 'text-right' : ''}`;
};

function moveBetweenRows(event: KeyboardEvent<HTMLTableSectionElement>) {
  const links = [...event.currentTarget.querySelectorAll<HTMLElement>('[data-row]')];
  const here = links.indexOf(document.activeElement as HTMLElement);
  if (here < 0) return;
  const next = { ArrowDown: here + 1, ArrowUp: here - 1, Home: 0, End: links.length - 1 }[event.key];
  if (next === undefined || !links[next]) return;
  event.preventDefault();
  links[next].focus();
}
