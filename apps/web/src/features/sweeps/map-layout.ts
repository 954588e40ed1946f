import type { Sweep, SweepPoint } from '@nightcone/contracts';

type State = SweepPoint['state'];
export type Look = 'done' | 'reused' | 'running' | 'failed' | 'out' | 'waiting';

export const lookOf: Record<State, Look> = {
  finished: 'done',
  reused: 'reused',
  running: 'running',
  failed: 'failed',
  'broken-off': 'failed',
  cancelled: 'out',
  'left-out': 'out',
  waiting: 'waiting',
  held: 'waiting',
  parked: 'waiting',
};
/** When several points share a cell the one that needs attention shows. */
const precedence: Look[] = ['failed', 'running', 'waiting', 'out', 'reused', 'done'];

/** So many cells stay quick to draw and to point at. */
const mostCells = 20_000;

export interface PointGrid {
  columns: number;
  rows: number;
  /** Points of one cell, along the columns and along the rows. */
  binX: number;
  binY: number;
  /** Look of each cell, row by row; a short last row ends early. */
  cells: Look[];
}

/** Rows × columns of the map: the last axis runs along the columns; a single axis is wrapped. */
export function gridShape(
  axes: Pick<Sweep, 'axes'>['axes'],
  points: number,
  width: number,
): [columns: number, rows: number] {
  if (axes.length < 2) {
    const columns = Math.max(1, Math.min(points, Math.floor(width / 18)));
    return [columns, Math.ceil(points / columns)];
  }
  const columns = Math.max(1, axes.at(-1)?.values.length ?? 1);
  return [columns, Math.ceil(points / columns)];
}

/** Cells of the map; neighbouring points share one when there are too many. */
export function gridCells(states: readonly State[], columns: number, rows: number): PointGrid {
  const bin = Math.max(1, Math.ceil(Math.sqrt((columns * rows) / mostCells)));
  const [binX, binY] = [Math.min(bin, columns), Math.min(bin, rows)];
  const across = Math.ceil(columns / binX);
  const down = Math.ceil(rows / binY);
  const cells: Look[] = new Array(across * down);
  states.forEach((state, index) => {
    const cell = Math.floor(Math.floor(index / columns) / binY) * across + Math.floor((index % columns) / binX);
    const look = lookOf[state];
    const there = cells[cell];
    if (there === undefined || precedence.indexOf(look) < precedence.indexOf(there)) cells[cell] = look;
  });
  return { columns: across, rows: down, binX, binY, cells };
}
