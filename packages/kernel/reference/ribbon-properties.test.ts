import type { Json } from '@nightcone/models';
import fc from 'fast-check';
import { beforeAll, describe, expect, it } from 'vitest';
import { type KernelInstance, loadCurrentKernel, openKernel } from '../src/node.ts';
import { valuesOf } from '../testing/run-job.ts';
import {
  armchair,
  dimerLines,
  expectCertified,
  expectLevels,
  extrapolated,
  levelsOf,
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

const number = (min: number, max: number) => fc.double({ min, max, noNaN: true });
const valleyEdges = fc.constantFrom<Json>(zigzag, walls(1), walls(-1), walls(1, -1));
const coefficient = (size: number) => fc.tuple(number(-size, size), number(-size / 10, size / 10));
const fixedSeed = { seed: 20260, numRuns: 25 };

describe('symmetries', () => {
  // common practice: time reversal exchanges the valleys and turns k and B round; strain keeps its K-sign gauge field
  it('E of K′ at (k; B) is E of K at (−k; −B)', () => {
    fc.assert(
      fc.property(
        valleyEdges,
        number(-20, 20),
        number(-0.4, 0.4),
        coefficient(0.1),
        coefficient(0.1),
        coefficient(0.1),
        (edge, fieldT, k, v, m, a) => {
          const fields = {
            potentialEv: polynomial(...v),
            massEv: polynomial(...m),
            gaugePerNm: polynomial(...a),
            width: nm(17),
            edge,
            spectrum: nearest(0, 6),
          };
          const here = runRibbon(kernel, { ...fields, valleys: 'K', fieldT, kPerNm: k }, single(30));
          const there = runRibbon(kernel, { ...fields, valleys: 'K-prime', fieldT: -fieldT, kPerNm: -k }, single(30));
          // walls swap the roles of S and D only through their signs; with masses outside the valleys differ by time reversal
          expectLevels(levelsOf(there), levelsOf(here), 1e-10, 1e-11);
        },
      ),
      fixedSeed,
    );
  });

  it('without potential and masses levels come in pairs ±E', () => {
    fc.assert(
      fc.property(
        fc.constantFrom<Members>({ edge: zigzag, width: nm(15) }, { edge: armchair, width: dimerLines(57) }),
        number(-20, 20),
        number(-0.4, 0.4),
        coefficient(0.2),
        (ribbon, fieldT, kPerNm, a) => {
          const fields = { fieldT, kPerNm, gaugePerNm: polynomial(...a), spectrum: nearest(0, 8) };
          const levels = levelsOf(runRibbon(kernel, { ...ribbon, ...fields }, single(30)));
          expectLevels(levels, levels.map((level) => -level).reverse(), 0, 1e-12);
        },
      ),
      fixedSeed,
    );
  });

  it('lengths times s, k over s, field over s² divides every level by s', () => {
    fc.assert(
      fc.property(
        valleyEdges,
        number(0.5, 3),
        number(5, 40),
        number(-10, 10),
        number(-0.3, 0.3),
        (edge, s, w, b, k) => {
          const at = (scale: number) =>
            runRibbon(
              kernel,
              {
                edge,
                valleys: 'K',
                width: nm(w * scale),
                fieldT: b / scale / scale,
                kPerNm: k / scale,
                spectrum: nearest(0, 5),
              },
              single(40),
            );
          expectLevels(
            levelsOf(at(s)).map((level) => level * s),
            levelsOf(at(1)),
            1e-9,
            1e-11,
          );
        },
      ),
      fixedSeed,
    );
  });
});

describe('completeness', () => {
  it('a window cut in two holds the levels of both halves, none twice', () => {
    fc.assert(
      fc.property(number(-0.2, 0.2), number(0, 15), number(-0.3, 0.3), (cut, fieldT, kPerNm) => {
        const ribbon = { width: dimerLines(90), fieldT, kPerNm, potentialEv: polynomial(0, 0.003) };
        const levels = (from: number, to: number) => {
          const result = runRibbon(kernel, { ...ribbon, spectrum: window(from, to) }, extrapolated(60));
          expectCertified(result);
          return levelsOf(result);
        };
        const whole = levels(-0.3, 0.3);
        expectLevels([...levels(-0.3, cut), ...levels(cut, 0.3)], whole, 0, 1e-10);
      }),
      fixedSeed,
    );
  });

  it('nearest levels are those of a window that holds them', () => {
    const ribbon = { edge: zigzag, valleys: 'K', width: nm(40), fieldT: 8, kPerNm: range(-0.3, 0.3, 13) };
    const near = runRibbon(kernel, { ...ribbon, spectrum: nearest(0.07, 5) });
    const all = runRibbon(kernel, { ...ribbon, spectrum: window(-0.4, 0.5) });
    for (let row = 0; row < 13; row++) {
      const wanted = levelsOf(all, row)
        .sort((a, b) => Math.abs(a - 0.07) - Math.abs(b - 0.07))
        .slice(0, 5)
        .sort((a, b) => a - b);
      expectLevels(levelsOf(near, row), wanted, 0, 1e-11);
    }
  });

  it('a cut pair of degenerate levels is marked', () => {
    const ribbon = { width: dimerLines(41), kPerNm: 0.05 };
    const cut = runRibbon(kernel, { ...ribbon, spectrum: nearest(0.3509840488, 1) });
    expect(valuesOf(cut, 'cutMultiplet')).toEqual([1]);
    const whole = runRibbon(kernel, { ...ribbon, spectrum: nearest(0.3509840488, 2) });
    expect(valuesOf(whole, 'cutMultiplet')).toEqual([0]);
  });

  it('levels nearly double at k → 0 of a metallic ribbon are told apart', () => {
    for (const k of [1e-12, 1e-9, 1e-6, 1e-3]) {
      const result = runRibbon(kernel, { width: dimerLines(41), kPerNm: k, spectrum: nearest(0, 2) });
      expectLevels(levelsOf(result), [-0.5751 * k, 0.5751 * k], 1e-6, 2e-14);
      expectCertified(result);
    }
  });
});
