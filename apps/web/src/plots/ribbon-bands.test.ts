import type { Mark, Role } from '@nightcone/drawing';
import { expect, test } from 'vitest';
import type { DataArray, ResultData } from './result-data.ts';
import { buildRibbonBands } from './ribbon-bands.ts';

const array = (name: string, values: DataArray['values'], ragged?: string): DataArray => ({
  name,
  shape: [values.length],
  dims: [],
  unit: '',
  values,
  ...(ragged ? { ragged } : {}),
});

/** Rows of levels over k = 0, 0.1, 0.2, …; `valleys` blocks one after the other. */
function ribbon(edge: string, valley: number[], rows: number[][], extra: DataArray[] = []): ResultData {
  const offsets = [0];
  for (const row of rows) offsets.push((offsets.at(-1) ?? 0) + row.length);
  const flat = rows.flat();
  const count = rows.length / valley.length;
  const arrays = [
    array(
      'kPerNm',
      Float64Array.from({ length: count }, (_, i) => i / 10),
    ),
    array('valley', Int32Array.from(valley)),
    array('offsets', Int32Array.from(offsets)),
    array('energies', Float64Array.from(flat), 'offsets'),
    array('velocities', new Float64Array(flat.length), 'offsets'),
    ...extra,
  ];
  return {
    body: {
      model: 'continuum-ribbon',
      parameters: { edge: { kind: edge }, width: { kind: 'nm', widthNm: 10 }, fieldT: 0 },
      numerics: {},
    },
    arrays: new Map(arrays.map((each) => [each.name, each])),
  };
}
const lines = (marks: readonly Mark[], role: Role) =>
  marks.filter((mark) => mark.kind === 'line' && mark.role === role && mark.slopes !== undefined);

test('valleys of a zigzag ribbon keep their own pens', () => {
  const { plot } = buildRibbonBands(ribbon('zigzag', [1, -1], [[0.1], [0.1], [0.1], [0.2], [0.2], [0.2]]));
  expect(lines(plot.marks, 'K')).toHaveLength(1);
  expect(lines(plot.marks, 'K-prime')).toHaveLength(1);
  expect(plot.key?.map(({ label }) => label)).toEqual(['K', 'K′']);
});

test('an armchair edge shows valleys only where two levels coincide, ink where they part', () => {
  const rows = [
    [0.1, 0.1],
    [0.1, 0.1],
    [0.1, 0.1002],
    [0.0985, 0.1015],
    [0.0985, 0.1015],
  ];
  const { plot, targets } = buildRibbonBands(ribbon('armchair', [0], rows));
  expect(lines(plot.marks, 'K').length).toBeGreaterThan(0);
  expect(lines(plot.marks, 'K-prime').length).toBeGreaterThan(0);
  expect(lines(plot.marks, 'mixed')).toHaveLength(2);
  expect(targets.describe(0).description).toContain('both valleys');
  expect(targets.describe(9).description).toContain('valleys mixed');
});

test('the error of a level stands behind its value only where there is one', () => {
  const errors = [
    array('errorEstimate', Float64Array.from([1e-6, 0]), 'offsets'),
    array('errorEstimateValid', Uint8Array.from([1, 0]), 'offsets'),
  ];
  const { targets } = buildRibbonBands(ribbon('zigzag', [1], [[0.1], [0.1]], errors));
  expect(targets.describe(0).value).toBe('100.0000(10) meV');
  expect(targets.describe(1).value).toBe('100 meV');
});
