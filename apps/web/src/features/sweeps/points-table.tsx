import type { SweepPoint } from '@nightcone/contracts';
import { type ColumnDef, createColumnHelper } from '@tanstack/react-table';
import { useMemo, useState } from 'react';
import { Link } from 'react-router-dom';
import { TextButton } from '../../components/button.tsx';
import { DataTable, type ServerTable } from '../../components/data-table.tsx';
import { SelectField } from '../../components/field.tsx';
import { ShortHash } from '../../components/hash-comb.tsx';
import { StateMark, stateWord } from '../../components/state-mark.tsx';
import { formatCount } from '../../lib/format-quantity.ts';
import { formatCpu } from '../../lib/format-time.ts';
import { type AxisName, pointWords } from './point-values.ts';

const column = createColumnHelper<ServerTable, SweepPoint>();
const pageSize = 50;

/** Every point with a link to its job: the map in words. */
export function PointsTable({ points, names }: { points: readonly SweepPoint[]; names: AxisName[] }) {
  const [state, setState] = useState('');
  const [page, setPage] = useState(0);
  const columns = useMemo(
    () =>
      column.columns([
        column.display({
          id: 'values',
          header: 'Point',
          cell: ({ row: { original: point } }) => (
            <Link to={`/jobs/${point.jobHash}`} data-row="" className="link">
              {pointWords(names, point.values)}
            </Link>
          ),
        }),
        column.display({ id: 'state', header: 'State', cell: ({ row }) => <StateMark state={row.original.state} /> }),
        column.display({
          id: 'hash',
          header: 'Job hash',
          meta: { wide: true },
          cell: ({ row }) => <ShortHash hash={row.original.jobHash} />,
        }),
        column.display({
          id: 'cpu',
          header: 'CPU',
          meta: { right: true, wide: true },
          cell: ({ row: { original: point } }) =>
            point.cpuMs === null ? '' : <span className="num">{formatCpu(point.cpuMs)}</span>,
        }),
      ]) as ColumnDef<ServerTable, SweepPoint, never>[],
    [names],
  );
  const states = [...new Set(points.map((point) => point.state))].sort();
  const chosen = state ? points.filter((point) => point.state === state) : points;
  const shown = chosen.slice(page * pageSize, (page + 1) * pageSize);
  return (
    <details className="mt-6">
      <summary className="cursor-pointer py-1 font-semibold font-serif text-h2">All points in a table</summary>
      <div className="my-3 w-48">
        <SelectField
          label="State"
          value={state}
          onChange={(event) => {
            setState(event.target.value);
            setPage(0);
          }}
        >
          <option value="">all states</option>
          {states.map((each) => (
            <option key={each} value={each}>
              {stateWord(each)}
            </option>
          ))}
        </SelectField>
      </div>
      <DataTable caption="Points of this sweep" columns={columns} rows={shown} rowId={(point) => String(point.index)} />
      <nav aria-label="Pages of the points" className="mt-2 flex gap-6 text-ink2 text-small">
        <span>
          {formatCount(chosen.length === 0 ? 0 : page * pageSize + 1)} to {formatCount(page * pageSize + shown.length)}{' '}
          of {formatCount(chosen.length)}
        </span>
        {page > 0 ? <TextButton onClick={() => setPage(page - 1)}>Previous</TextButton> : null}
        {(page + 1) * pageSize < chosen.length ? <TextButton onClick={() => setPage(page + 1)}>Next</TextButton> : null}
      </nav>
    </details>
  );
}
