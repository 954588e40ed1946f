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
  mixedFields,
  nearest,
  nm,
  polynomial,
  runRibbon,
  single,
  values,
  walls,
  window,
  zigzag,
} from './ribbon-questions.ts';

/**
 * Whole jobs of `continuum-ribbon` against values from outside. Tags in brackets number the check tables, which were
 * made with general-purpose libraries from the published formulas named beside them. Tolerances: matrices 1e-10
 * relative or 1e-11 eV; values for h → 0 1e-7 relative or 1e-9 eV (most agree to all printed digits).
 */
let kernel: KernelInstance;
beforeAll(async () => {
  kernel = openKernel((await loadCurrentKernel()).module);
});

describe('zigzag', () => {
  // published source: L. Brey, H. A. Fertig, PRB 73, 235411 (2006), quantisation re-derived
  const c1 = [
    [-0.3, [0.000855376044014, 0.202597357264, 0.268535099966, 0.347131784472]],
    [-0.05, [0.028755, 0.132369008596, 0.223992989344, 0.314863795657]],
    [0, [0.045168248377, 0.135504745131, 0.225841241885, 0.316177738639]],
    [0.1, [0.087403845295, 0.157175517435, 0.239803365257, 0.326377935187]],
  ] as const;
  it('[C1] levels of a uniform ribbon with its edge state', () => {
    const result = runRibbon(kernel, {
      edge: zigzag,
      width: nm(20),
      valleys: 'K',
      kPerNm: values(...c1.map(([k]) => k)),
      spectrum: window(0, 0.35),
    });
    c1.forEach(([, expected], row) => {
      expectLevels(levelsOf(result, row), [...expected], 1e-10, 1e-11);
    });
    expectCertified(result, 'transcendental-quantisation');
  });

  // published source: the same, on the staggered grid of R. Stacey, PRD 26, 468 (1982)
  it.each([
    [50, [0.00085084927191, 0.20249012998, 0.26814457404]],
    [100, [0.00085423270793, 0.20257028219, 0.26843646418]],
    [200, [0.00085508876017, 0.20259055464, 0.26851031595]],
    [400, [0.0008553040422, 0.20259565236, 0.26852888836]],
  ])('[C2] levels on a single grid of %d cells', (cells, expected) => {
    const parameters = { edge: zigzag, width: nm(20), valleys: 'K', kPerNm: -0.3, spectrum: window(0, 0.3) };
    const result = runRibbon(kernel, parameters, single(cells));
    expectLevels(levelsOf(result), expected, 1e-10, 2e-11);
    expect(valuesOf(result, 'errorEstimateValid')).toEqual([0, 0, 0]);
  });

  it('[C2] three grids from 50 cells reach 1e-12', () => {
    const parameters = { edge: zigzag, width: nm(20), valleys: 'K', kPerNm: -0.3, spectrum: window(0, 0.3) };
    const levels = levelsOf(runRibbon(kernel, parameters, extrapolated(50)));
    expectLevels(levels, [0.0008553760440147, 0.2025973572642, 0.2685350999659], 0, 2e-12);
  });

  // published source: L. Brey, H. A. Fertig, PRB 73, 195408 (2006), setting of the edge channels
  const c7 = [
    [0.0001523219433, 0.1002509582, 0.1417973657, 0.1737827098],
    [0.01174666262, 0.1047472924, 0.1512863794, 0.1893152892],
    [0.03714564488, 0.1218850943, 0.1723312285],
    [0.07549250006, 0.1525371783],
    [0.102188457, 0.1753169003],
    [0.0001523219433, 0.1002509582, 0.1417973657, 0.1737827098],
    [1.228780162e-7, 0.1009338135, 0.1449884337, 0.1814861431],
    [1.293023599e-9, 0.1069086037, 0.1578151667, 0.1993682596],
    [0.1254940962, 0.1825301109],
    [0.1431507295],
  ];
  it('[C7] edge channels of both valleys in 10 T', () => {
    const k = [0, 0.2, 0.3, 0.4, 0.46];
    const parameters = { edge: zigzag, width: nm(60), fieldT: 10, kPerNm: values(...k), spectrum: window(1e-9, 0.2) };
    const result = runRibbon(kernel, parameters, extrapolated(400));
    c7.forEach((expected, row) => {
      expectLevels(levelsOf(result, row), expected, 1e-9, 1e-10);
    });
    expectCertified(result);
  });
});

describe('armchair', () => {
  // published source: L. Brey, H. A. Fertig, PRB 73, 235411 (2006), q = nπ/W − 4π/3a
  it.each([
    [40, 5.04199990083, [0.12285778546, 0.24061502803, 0.47864581559, 0.59791846064, 0.83661157995]],
    [41, 5.16497550817, [0.028755, 0.35098404885, 0.35098404885, 0.70019901465, 0.70019901465]],
    [42, 5.28795111551, [0.11746369677, 0.22958730401, 0.4564655196, 0.5701741847, 0.79774650218]],
  ])('[C3] lowest levels of %d dimer lines', (lines, width, expected) => {
    const result = runRibbon(kernel, { width: dimerLines(lines), kPerNm: 0.05, spectrum: window(0, 0.85) });
    expectLevels(levelsOf(result), expected, 1e-9, 1e-11);
    expect(valuesOf(result, 'widthNm')[0]).toBeCloseTo(width, 10);
    expectCertified(result, 'transcendental-quantisation', 'transfer-trace');
  });
});

describe('infinite mass', () => {
  // published source: M. V. Berry, R. J. Mondragon, Proc. R. Soc. A 412, 53 (1987)
  it.each([
    [0, [0.0731270863733, 0.147203722959, 0.233048635774, 0.321365465647]],
    [0.05, [0.0996419964133, 0.163850294714, 0.244144536115, 0.329558036301]],
    [-0.1, [0.0578444766505, 0.162826088963, 0.242435798376, 0.328076277235]],
  ])('[C4] levels with mass %d eV inside', (mass, expected) => {
    const result = runRibbon(kernel, {
      edge: walls(1),
      width: nm(20),
      valleys: 'K',
      kPerNm: 0.1,
      massEv: polynomial(mass),
      spectrum: window(0, 0.35),
    });
    expectLevels(levelsOf(result), expected, 1e-10, 1e-11);
  });

  // published source: the same; exact matching to a finite mass outside. The steps lie between grid sites, so the levels
  // carry the last difference of the grids as their error
  it.each([
    [0.5, 0.0716342333868, 0.00074643],
    [1, 0.0723538482216, 0.00077324],
    [2, 0.0727333649083, 0.00078744],
    [4, 0.0729283956919, 0.00079476],
    [8, 0.0730272764448, 0.00079848],
  ])('[C9] a wall of %d eV approaches the infinite one as 1/mass', (wall, expected, product) => {
    const pad = (20 * 0.5751) / wall; // the wave is e^{−20} where the outer wall stands
    const result = runRibbon(
      kernel,
      {
        edge: walls(1),
        valleys: 'K',
        width: nm(20 + 2 * pad),
        kPerNm: 0.1,
        massEv: { kind: 'steps', edges: [-10, 10], values: [wall, 0, wall] },
        spectrum: window(0.05, 0.1),
      },
      extrapolated(1000),
    );
    const error = valuesOf(result, 'errorEstimate')[0] as number;
    expect(error).toBeLessThan(1e-6);
    expectLevels(levelsOf(result), [expected], 0, Math.max(2 * error, 1e-9));
    expect((0.0731270863733 - (levelsOf(result)[0] as number)) * wall).toBeCloseTo(product, 5);
  });

  it('opposite walls hold the chiral mode ±ħvk of either valley', () => {
    const result = runRibbon(kernel, {
      edge: walls(1, -1),
      width: nm(20),
      kPerNm: 0.1,
      spectrum: nearest(0, 1),
    });
    expectLevels(levelsOf(result, 0), [0.05751], 1e-12, 1e-12);
    expectLevels(levelsOf(result, 1), [-0.05751], 1e-12, 1e-12);
    expectCertified(result, 'chiral-mode');
  });
});

describe('field, potential, mass and strain together', () => {
  // published sources of the equations as above; values by independent diagonalisation and by shooting
  it.each([
    ['zigzag, K', { edge: zigzag, width: nm(20), valleys: 'K' }, [-0.0439778795958, 0.0828608740169]],
    [
      'zigzag, K′',
      { edge: zigzag, width: nm(20), valleys: 'K-prime' },
      [-0.137149425283, -0.0345612240407, 0.0501189036704],
    ],
    ['walls, K', { edge: walls(1), width: nm(20), valleys: 'K' }, [-0.136170061245, -0.0251764734213, 0.126158131365]],
    ['walls, K′', { edge: walls(1), width: nm(20), valleys: 'K-prime' }, [-0.107578324812, 0.0545066040535]],
    ['armchair, 80 lines', { edge: armchair, width: dimerLines(80) }, [-0.0290109803192, 0.0511098661992]],
    [
      'armchair, 82 lines',
      { edge: armchair, width: dimerLines(82) },
      [-0.124864696327, -0.0534074882477, 0.0749717928057],
    ],
  ])('[C5] all levels within 0.14 eV: %s', (_, parameters, expected) => {
    const result = runRibbon(kernel, { ...mixedFields, ...parameters, spectrum: window(-0.14, 0.14) });
    expectLevels(levelsOf(result), expected, 1e-11, 1e-12);
    expectCertified(result);
  });

  it.each([
    [
      'zigzag, K',
      { edge: zigzag, width: nm(20), valleys: 'K' },
      [-0.225065646055, -0.143385549828, -0.043984480275, 0.0828449569491, 0.170508306789, 0.255380629458],
    ],
    [
      'zigzag, K′',
      { edge: zigzag, width: nm(20), valleys: 'K-prime' },
      [-0.22377435857, -0.137019313745, -0.0345629858, 0.0501134365318, 0.172048517884, 0.258549307677],
    ],
    [
      'walls +1',
      { edge: walls(1), width: nm(20), valleys: 'K' },
      [-0.221818439231, -0.13607349637, -0.0251690161317, 0.126142728232, 0.187836167516, 0.262433541009],
    ],
    [
      'walls −1',
      { edge: walls(-1), width: nm(20), valleys: 'K' },
      [-0.217668484896, -0.137336730084, -0.0776334792944, 0.0157986296905, 0.160849647249, 0.249457662188],
    ],
    [
      'armchair, 80 lines',
      { edge: armchair, width: dimerLines(80) },
      [-0.182421992515, -0.175677011037, -0.0290121479594, 0.0511157588638, 0.198774463049, 0.206673590217],
    ],
  ])('[C6] the matrix of 40 cells: %s', (_, parameters, expected) => {
    const result = runRibbon(kernel, { ...mixedFields, ...parameters, spectrum: nearest(0, 6) }, single(40));
    expectLevels(levelsOf(result), expected, 1e-10, 1e-11);
  });
});

describe('Landau levels in a wide ribbon', () => {
  // published source: J. W. McClure, Phys. Rev. 104, 666 (1956); boxes and errors as in [B8]
  const length = 8.11302629696;
  it('[B8] the grid converges in second order at k = 0', () => {
    const errors = [80, 160, 320].map((cells) => {
      const parameters = { edge: walls(1), width: nm(16 * length), fieldT: 10, kPerNm: 0, valleys: 'K' };
      const result = runRibbon(kernel, { ...parameters, spectrum: window(0.05, 0.12) }, single(cells));
      return (levelsOf(result)[0] as number) - 0.100247945705;
    });
    const ratios = errors.slice(1).map((error, i) => (errors[i] as number) / error);
    for (const ratio of ratios) expect(ratio).toBeGreaterThan(3.9);
    for (const ratio of ratios) expect(ratio).toBeLessThan(4.1);
  });

  it.each([
    ['zigzag', zigzag],
    ['walls', walls(1)],
    ['armchair', armchair],
  ])('%s edges leave the ladder alone', (_, edge) => {
    const parameters = { edge, width: nm(16 * length), fieldT: 10, kPerNm: 0, spectrum: window(-0.3, 0.3) };
    expectCertified(runRibbon(kernel, parameters), 'landau-ladder');
  });

  it('zero modes at opposite edges, closer than a double can tell, are found with their vectors', () => {
    // published source: L. Brey, H. A. Fertig, PRB 73, 195408 (2006): the n = 0 branches of a wide strip
    const parameters = { edge: zigzag, width: nm(100), fieldT: 12, kPerNm: values(-0.85, -0.5, 0, 0.5, 0.85) };
    const result = runRibbon(kernel, { ...parameters, valleys: 'both', spectrum: window(-0.05, 0.05) });
    expectCertified(result, 'plus-minus-symmetry');
    for (let row = 1; row <= 3; row++) expect(levelsOf(result, row)).toHaveLength(2);
  });

  it('[B3] a crossed field in a strip follows the closed form', () => {
    // published source: V. Lukose, R. Shankar, G. Baskaran, PRL 98, 116802 (2007); β = 0.3, k = 0, so no shift
    const slope = 0.00262119212782;
    const result = runRibbon(kernel, {
      edge: walls(1),
      width: nm(150),
      fieldT: 10,
      valleys: 'K',
      kPerNm: 0,
      potentialEv: polynomial(0, slope),
      spectrum: nearest(0, 40),
    });
    const levels = levelsOf(result);
    // [B3] lists the levels at k = 0.07 nm⁻¹ with the shift −βħvk, taken off again here
    for (const level of [-0.10547917532, 0.081324975317, 0.12001338167].map((e) => e + 0.0120771)) {
      const nearestLevel = levels.reduce((a, b) => (Math.abs(b - level) < Math.abs(a - level) ? b : a));
      expect(Math.abs(nearestLevel - level)).toBeLessThan(1e-9);
    }
  });
});
