import { spawnSync } from 'node:child_process';
import { fileURLToPath } from 'node:url';
import { loadCurrentKernel, openKernel } from '@nightcone/kernel/node';
import { type Json, parseSpecification } from '@nightcone/models';
import { describe, expect, it } from 'vitest';

/**
 * Whole jobs of `continuum-ribbon` with random parameters from a fixed seed against dense diagonalisation by SciPy
 * (LAPACK) of matrices written down apart from the kernel.
 */
const python = '/usr/bin/python3';
const hasScipy = spawnSync(python, ['-c', 'import scipy.linalg']).status === 0;
if (!hasScipy)
  console.warn(`Skipped: ${python} has no scipy. On Debian: apt-get install python3-scipy, then run this group again.`);

type Members = { [name: string]: Json };

/** Numbers in [0, 1) from a fixed linear congruence (D. E. Knuth's MMIX). */
function sequence(seed: bigint): () => number {
  let state = seed;
  return () => {
    state = BigInt.asUintN(64, state * 6364136223846793005n + 1442695040888963407n);
    return Number(state >> 11n) / 2 ** 53;
  };
}

function randomJob(next: () => number): { parameters: Members; numerics: Members; widthNm: number } {
  const between = (low: number, high: number) => low + (high - low) * next();
  const pick = <T>(list: readonly T[]): T => list[Math.floor(next() * list.length)] as T;
  const profile = (size: number): Json =>
    pick<() => Json>([
      () => ({ kind: 'none' }),
      () => ({ kind: 'polynomial', coefficients: [between(-size, size), between(-size, size) / 10, size / 200] }),
      () => ({ kind: 'sine', amplitude: between(-size, size), periodNm: between(4, 20), phase: between(0, 6) }),
    ])();
  const edge = pick<Members>([
    { kind: 'zigzag' },
    { kind: 'armchair' },
    { kind: 'armchair' },
    { kind: 'infinite-mass', lowerSign: pick([1, -1]), upperSign: pick([1, -1]) },
    { kind: 'periodic', blochPhaseRad: pick([0, Math.PI, between(-3, 3)]) },
  ]);
  const lines = Math.floor(between(10, 160));
  const isArmchair = edge.kind === 'armchair';
  const widthNm = isArmchair ? ((lines + 1) * Math.sqrt(3) * 0.142) / 2 : between(5, 40);
  const isPeriodic = edge.kind === 'periodic';
  return {
    widthNm,
    parameters: {
      edge,
      width: isArmchair ? { kind: 'dimer-lines', count: lines } : { kind: 'nm', widthNm },
      valleys: 'both',
      fieldT: isPeriodic ? 0 : pick([0, between(-20, 20)]),
      potentialEv: profile(0.1),
      massEv: profile(0.08),
      valleyMassEv: profile(0.03),
      gaugePerNm: profile(0.1),
      fieldProfileT: isPeriodic ? { kind: 'none' } : profile(10),
      kPerNm: { kind: 'values', values: [-0.31, 0, between(-0.5, 0.5)] },
      energyEv: 0,
      spectrum: { kind: 'nearest', energyEv: between(-0.2, 0.2), count: Math.floor(between(1, 12)) },
    },
    numerics: { grid: { kind: 'single', cells: 2 * Math.floor(between(15, 60)) }, states: [] },
  };
}

describe.skipIf(!hasScipy)('continuum-ribbon against SciPy', () => {
  it('gives the levels of dense diagonalisation in 60 random jobs', async () => {
    const { module } = await loadCurrentKernel();
    const kernel = openKernel(module);
    const next = sequence(20261201n);
    const jobs = Array.from({ length: 60 }, () => randomJob(next)).map(({ parameters, numerics, widthNm }) => {
      const question = { model: 'continuum-ribbon', parameters, numerics, kernel: '0'.repeat(64) };
      const parsed = parseSpecification(kernel.manifest, question);
      if (!parsed.ok) throw new Error(JSON.stringify(parsed.problems));
      return { specification: parsed.specification, widthNm };
    });
    const asked = jobs.map(({ specification: { parameters, numerics }, widthNm }) => {
      const spectrum = parameters.spectrum as Members;
      return {
        ...parameters,
        widthNm,
        grid: numerics.grid,
        valleySigns: (parameters.edge as Members).kind === 'armchair' ? [1] : [1, -1],
        waveNumbers: (parameters.kPerNm as Members).values,
        energyEv: spectrum.energyEv,
        count: spectrum.count,
      };
    });
    const script = fileURLToPath(new URL('./ribbon-matrices.py', import.meta.url));
    const answer = spawnSync(python, [script], { input: JSON.stringify(asked), maxBuffer: 1 << 28, encoding: 'utf8' });
    if (answer.status !== 0) throw new Error(answer.stderr);
    const expected = JSON.parse(answer.stdout) as number[][][];
    jobs.forEach(({ specification }, job) => {
      kernel.open(specification);
      const payloads = Array.from({ length: kernel.sliceCount() }, (_, slice) => kernel.computeSlice(slice));
      const { arrays } = kernel.assemble(payloads);
      const bytes = (name: string) => arrays.find((array) => array.name === name)?.bytes.slice().buffer as ArrayBuffer;
      const energies = new Float64Array(bytes('energies'));
      const offsets = new Int32Array(bytes('offsets'));
      expected[job]?.forEach((levels, row) => {
        const found = [...energies.slice(offsets[row], offsets[row + 1])];
        const where = `job ${job}, row ${row}: ${JSON.stringify(specification.parameters)}`;
        expect(found, where).toHaveLength(levels.length);
        // 1e-10 relative to the scale of the spectrum looked at, and LAPACK's own n ε ‖H‖
        found.forEach((level, i) => {
          expect(Math.abs(level - (levels[i] as number)), where).toBeLessThan(2e-11);
        });
      });
    });
  });
});
