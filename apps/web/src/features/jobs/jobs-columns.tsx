import type { JobSummary } from '@nightcone/contracts';
import { type ColumnDef, createColumnHelper } from '@tanstack/react-table';
import { Link } from 'react-router-dom';
import { Clock } from '../../components/clock.tsx';
import type { ServerTable } from '../../components/data-table.tsx';
import { ShortHash } from '../../components/hash-comb.tsx';
import { StateMark } from '../../components/state-mark.tsx';
import { formatCpu } from '../../lib/format-time.ts';
import { modelWords } from '../../lib/model-words.ts';
import { jobStateWord } from './job-state.ts';

const column = createColumnHelper<ServerTable, JobSummary>();

export const jobColumns = column.columns([
  column.display({ id: 'state', header: 'State', cell: ({ row }) => <StateMark state={jobStateWord(row.original)} /> }),
  column.display({
    id: 'title',
    header: 'Question',
    cell: ({ row: { original: job } }) => (
      <Link to={`/jobs/${job.hash}`} data-row="" className="link">
        {job.title}
      </Link>
    ),
  }),
  column.accessor('model', { header: 'Model', meta: { wide: true }, cell: (cell) => modelWords(cell.getValue()) }),
  column.display({
    id: 'hash',
    header: 'Job hash',
    meta: { wide: true },
    cell: ({ row }) => <ShortHash hash={row.original.hash} />,
  }),
  column.display({
    id: 'askedBy',
    header: 'Asked by',
    meta: { wide: true },
    cell: ({ row }) => row.original.askedBy.label,
  }),
  column.accessor('cpuMs', {
    header: 'CPU',
    meta: { right: true, wide: true },
    cell: (cell) => {
      const cpuMs = cell.getValue();
      return cpuMs === null ? '' : <span className="num whitespace-nowrap">{formatCpu(cpuMs)}</span>;
    },
  }),
  column.accessor('createdAt', {
    header: 'Asked',
    meta: { right: true, wide: true },
    cell: (cell) => <Clock at={cell.getValue()} />,
  }),
  column.accessor('finishedAt', {
    header: 'Finished',
    meta: { right: true, wide: true },
    cell: (cell) => {
      const at = cell.getValue();
      return at === null ? '' : <Clock at={at} />;
    },
  }),
]) as ColumnDef<ServerTable, JobSummary, never>[];
