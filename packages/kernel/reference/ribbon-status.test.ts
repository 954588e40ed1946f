import { beforeAll, describe, expect, it } from 'vitest';
import { KernelRefusal } from '../src/index.ts';
import { type KernelInstance, loadCurrentKernel, openKernel } from '../src/node.ts';
import {
  armchair,
  dimerLines,
  type Members,
  nearest,
  nm,
  polynomial,
  range,
  runRibbon,
  single,
  walls,
  window,
  zigzag,
} from './ribbon-questions.ts';

let kernel: KernelInstance;
beforeAll(async () => {
  kernel = openKernel((await loadCurrentKernel()).module);
});

function refusalOf(parameters: Members, numerics: Members = {}, columns?: number[][]): KernelRefusal {
  const digest = 'ab'.repeat(32);
  const tables = columns && new Map([[digest, { columns: columns.map(toColumn) }]]);
  try {
    runRibbon(kernel, parameters, numerics, tables);
  } catch (error) {
    if (error instanceof KernelRefusal) return error;
    throw error;
  }
  throw new Error('The kernel took it.');
}
const toColumn = (list: number[], i: number) => ({
  role: i === 0 ? 'x' : 'value',
  unit: i === 0 ? 'nm' : 'eV',
  values: new Float64Array(list),
});
const table = { kind: 'table', table: 'ab'.repeat(32) };
const chains = { kind: 'zigzag-chains', count: 30, rule: 'matching' };
const periodic = { kind: 'periodic', blochPhaseRad: 0 };

describe('what continuum-ribbon refuses', () => {
  it.each<[string, string, Members, Members, RegExp]>([
    ['a wall without a sign', 'invalid-parameter', { edge: walls(0), width: nm(20) }, {}, /lowerSign and upperSign/],
    ['dimer lines on a zigzag edge', 'invalid-parameter', { edge: zigzag, width: dimerLines(40) }, {}, /armchair edge/],
    ['dimer lines between walls', 'invalid-parameter', { edge: walls(1), width: dimerLines(40) }, {}, /armchair edge/],
    ['chains on an armchair edge', 'invalid-parameter', { edge: armchair, width: chains }, {}, /zigzag edge/],
    ['one valley of an armchair ribbon', 'invalid-parameter', { valleys: 'K' }, {}, /mixes the valleys/],
    ['an odd armchair ring', 'invalid-parameter', {}, single(41), /even number of cells/],
    [
      'a periodic strip in a uniform field',
      'invalid-parameter',
      { edge: periodic, width: nm(20), fieldT: 1 },
      {},
      /integral over the width is 0/,
    ],
    ['an empty window', 'invalid-parameter', { spectrum: window(0.1, 0.1) }, {}, /eMin < eMax/],
    ['more levels than the grid has', 'invalid-parameter', { spectrum: nearest(0, 80) }, single(40), /cannot prove/],
    ['a state that is not on the axis', 'invalid-parameter', { kPerNm: range(0, 1, 5) }, { states: [5] }, /increasing/],
    ['states out of order', 'invalid-parameter', { kPerNm: range(0, 1, 5) }, { states: [3, 1] }, /increasing/],
    [
      'steps whose edges do not increase',
      'invalid-parameter',
      { massEv: { kind: 'steps', edges: [1, 1], values: [0, 1, 2] } },
      {},
      /massEv: edges must increase/,
    ],
    [
      'densities of 4 GiB and more',
      'memory-exceeded',
      { spectrum: nearest(0, 400) },
      { grid: { kind: 'extrapolated', cells: 20000 }, states: Array.from({ length: 64 }, (_, i) => i) },
      /does not fit/,
    ],
  ])('%s: %s', (_, status, parameters, numerics, words) => {
    const refusal = refusalOf(parameters, numerics);
    expect(refusal.status).toBe(status);
    expect(refusal.message).toMatch(words);
  });

  it('a table that ends inside the strip: outside-table', () => {
    const refusal = refusalOf({ width: dimerLines(80), potentialEv: table }, {}, [
      [-4, 0, 4],
      [0, 0.01, 0],
    ]);
    expect(refusal.status).toBe('outside-table');
    expect(refusal.message).toMatch(/potentialEv/);
  });

  it('but a field whose mean the profile takes away again is taken', () => {
    const fields = { fieldT: 5, fieldProfileT: polynomial(-6, 0, 0.03) };
    // mean of −6 + 0.03 u² over ±10 nm: −6 + 1 = −5
    expect(() => runRibbon(kernel, { edge: periodic, width: nm(20), kPerNm: 0.1, ...fields })).not.toThrow();
  });
});
