import type { ResultArrayData } from '@nightcone/kernel';
import { expect, test } from 'vitest';
import { placingOf, raggedLayout } from './ragged-layout.ts';

const array = (name: string, shape: number[], dims: string[], values: number[], ragged?: string): ResultArrayData => ({
  name,
  dtype: 'i32',
  shape,
  dims,
  unit: '',
  ...(ragged === undefined ? {} : { ragged }),
  bytes: new Uint8Array(new Int32Array(values).buffer),
});
const k = array('k', [3], ['k'], [0, 1, 2]);
// two valleys, three k: lists of 1, 0, 2 and 0, 0, 1 levels
const offsets = array('offsets', [7], ['row'], [0, 1, 1, 3, 3, 3, 4]);
const energies = array('energies', [4], ['valley', 'k', 'level'], [1, 2, 3, 4], 'offsets');
const densities = array('densities', [4, 2], ['valley', 'k', 'level', 'position'], [1, 2, 3, 4, 5, 6, 7, 8], 'offsets');

test('lists are placed by the dimensions of their rows; a length that no array states follows from the rows', () => {
  const all = [k, offsets, energies, densities];
  expect(raggedLayout(energies, all)).toMatchObject({
    rowDims: ['valley', 'k'],
    rowShape: [2, 3],
    listDim: 'level',
    entryDims: [],
  });
  const { dims, place } = placingOf(energies, all);
  expect(dims).toEqual(['valley', 'k', 'level']);
  expect([0, 1, 2, 3].map(place)).toEqual([
    [0, 0, 0],
    [0, 2, 0],
    [0, 2, 1],
    [1, 2, 0],
  ]);
});

test('entries that are arrays themselves have their own dimensions behind', () => {
  const { dims, place } = placingOf(densities, [k, offsets, energies, densities]);
  expect(dims).toEqual(['valley', 'k', 'level', 'position']);
  expect([0, 1, 2, 7].map(place)).toEqual([
    [0, 0, 0, 0],
    [0, 0, 0, 1],
    [0, 2, 0, 0],
    [1, 2, 0, 1],
  ]);
});

test('rows whose dimensions are not known are numbered', () => {
  const { dims, place } = placingOf(energies, [offsets, energies]);
  expect(dims).toEqual(['row of offsets', 'level']);
  expect([0, 1, 2, 3].map(place)).toEqual([
    [0, 0],
    [2, 0],
    [2, 1],
    [5, 0],
  ]);
});

test('an array that is not ragged, or whose offsets are missing, has no such layout', () => {
  expect(raggedLayout(k, [k])).toBeUndefined();
  expect(raggedLayout(energies, [energies])).toBeUndefined();
  expect(placingOf(k, [k]).place(2)).toEqual([2]);
});
