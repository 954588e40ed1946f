import type { ResultArrayData } from '@nightcone/kernel';
import { type ArrayValues, arrayValues, indexOf } from './array-values.ts';

/**
 * How a ragged array is laid out. Its values are lists one after the other, one list per row; `dims` names the
 * dimensions of the rows, then the one along the list, then those of each entry (where `shape` has more than one
 * number). `energies` along `valley, k, level` of shape [1608] has a list of levels for every valley and k.
 */
export interface RaggedLayout {
  rowDims: string[];
  /** Length of every row dimension; undefined where the result does not tell. */
  rowShape: number[] | undefined;
  listDim: string;
  entryDims: string[];
  entryShape: number[];
  /** First 0, one more than rows. */
  offsets: ArrayValues;
}

/** Layout of a ragged array; undefined for any other, and where its offsets are missing. */
export function raggedLayout(array: ResultArrayData, all: readonly ResultArrayData[]): RaggedLayout | undefined {
  const found = array.ragged === undefined ? undefined : all.find(({ name }) => name === array.ragged);
  if (found === undefined) return undefined;
  const { dims, shape } = array;
  const offsets = arrayValues(found);
  const rowDims = dims.slice(0, dims.length - shape.length);
  return {
    rowDims,
    rowShape: rowShapeOf(rowDims, offsets.length - 1, all),
    listDim: dims[rowDims.length] ?? 'entry',
    entryDims: dims.slice(rowDims.length + 1),
    entryShape: shape.slice(1),
    offsets,
  };
}

/** Lengths as other arrays state them; one that none states follows from the number of rows. */
function rowShapeOf(dims: string[], rows: number, all: readonly ResultArrayData[]): number[] | undefined {
  const lengths = dims.map((dim) => lengthOf(dim, all));
  const known = lengths.reduce<number>((product, length) => product * (length ?? 1), 1);
  const unknown = lengths.filter((length) => length === undefined).length;
  if (unknown > 1 || known === 0) return undefined;
  const shape = lengths.map((length) => length ?? rows / known);
  return shape.every(Number.isInteger) && shape.reduce((a, b) => a * b, 1) === rows ? shape : undefined;
}

function lengthOf(dim: string, all: readonly ResultArrayData[]): number | undefined {
  const stating = all.find(({ dims, shape }) => dims.length === shape.length && dims.includes(dim));
  return stating?.shape[stating.dims.indexOf(dim)];
}

/** Names of the columns that place a value, and the place of the value at `flat`, to be asked in ascending order. */
export interface Placing {
  dims: string[];
  place(flat: number): number[];
}

/** Placing of any array: row-major; ragged ones by the row's dimensions, or by its number where they are not known. */
export function placingOf(array: ResultArrayData, all: readonly ResultArrayData[]): Placing {
  const layout = raggedLayout(array, all);
  if (layout === undefined) return { dims: array.dims, place: (flat) => indexOf(flat, array.shape) };
  const { rowDims, rowShape, listDim, entryDims, entryShape, offsets } = layout;
  const entrySize = entryShape.reduce((a, b) => a * b, 1);
  let row = 0;
  return {
    dims: [...(rowShape ? rowDims : [`row of ${array.ragged}`]), listDim, ...entryDims],
    place(flat) {
      const within = flat % entrySize;
      const entry = (flat - within) / entrySize;
      while (row + 2 < offsets.length && (offsets[row + 1] ?? 0) <= entry) row += 1;
      const inList = entry - (offsets[row] ?? 0);
      return [...(rowShape ? indexOf(row, rowShape) : [row]), inList, ...indexOf(within, entryShape)];
    },
  };
}
