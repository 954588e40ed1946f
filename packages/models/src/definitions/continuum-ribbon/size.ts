import { floor, is, least, minus, most, over, read, root, sum, times } from '../../build-expression.ts';
import type { Expression } from '../../expression.ts';

/**
 * Sizes and costs of a job, as trees over its record. Slice count and cost repeat the kernel's own cut operation for
 * operation (assembly/models/continuum-ribbon/blocks.ts); bytes are bounds. Tests compare all of them with the kernel.
 */
const isArmchair = is('/parameters/edge', 'armchair');
const isRing = sum(isArmchair, is('/parameters/edge', 'periodic'));
const isOpen = minus(1, isRing);
const isWindow = is('/parameters/spectrum', 'window');
const isExtrapolated = is('/numerics/grid', 'extrapolated');
const valleyCount = sum(1, times(minus(1, isArmchair), is('/parameters/valleys', 'both')));
const spinCount = sum(1, is('/parameters/spin', 'zeeman'));
const wave = read('/parameters/kPerNm');
const energies = read('/parameters/energyEv');
const series = times(valleyCount, spinCount);

const widthNm = sum(
  read('/parameters/width/widthNm'),
  times(
    is('/parameters/width', 'dimer-lines'),
    times(times(0.5, sum(read('/parameters/width/count'), 1)), times(root(3), read('/parameters/bondLengthNm'))),
  ),
  times(
    is('/parameters/width', 'zigzag-chains'),
    times(
      sum(
        times(1.5, read('/parameters/width/count')),
        sum(0.75, times(0.25, is('/parameters/width/rule', 'geometric'))),
      ),
      read('/parameters/bondLengthNm'),
    ),
  ),
);
const chainLength = times(sum(1, isArmchair), widthNm);
/** Mean number of subbands in the window; 0 for a window upside down, at most the whole grid. */
const cells = read('/numerics/grid/cells');
const windowed = least(
  most(
    0,
    over(
      times(minus(read('/parameters/spectrum/eMax'), read('/parameters/spectrum/eMin')), chainLength),
      times(3, read('/parameters/diracVelocityEvNm')),
    ),
  ),
  times(2, cells),
);
const expectedLevels = sum(
  times(minus(1, isWindow), sum(read('/parameters/spectrum/count'), 4)),
  times(isWindow, sum(windowed, 4)),
);

/** Operations per site of one wave number: per level, and for counts and setting up. */
const perLevel = sum(times(40, isRing), times(18, isOpen));
const perSite = sum(times(140, isRing), times(80, isOpen));
const sites = times(times(2, cells), sum(1, times(6, isExtrapolated)));
const pointWork = sum(times(sites, sum(times(expectedLevels, perLevel), perSite)), 20_000);

const longest = least(24, most(4, floor(over(1e9, pointWork))));
const blocks = floor(over(minus(sum(wave, longest), 1), longest));
export const sliceCount: Expression = times(series, blocks);
export const cost: Expression = times(series, pointWork, sum(wave, blocks));
export const assembleCost: Expression = sum(1e5, times(series, wave, sum(200, times(4, energies))));

/** Sites of the finest grid, and positions of a density. */
const finest = times(times(2, cells), sum(1, times(3, isExtrapolated)));
const positions = minus(sum(finest, 1), times(0.5, finest, isArmchair));
const listed = sum(times(minus(1, isWindow), read('/parameters/spectrum/count')), times(isWindow, sum(windowed, 2)));
/** Levels solved at one wave number at most, with the margins on both sides. */
const solved = sum(times(1.5, expectedLevels), 24);
const states = read('/numerics/states');

const perPosition = times(16, positions);
export const resultBytes: Expression = sum(
  times(8, wave),
  times(17, energies),
  times(8, positions, least(1, states)),
  times(valleyCount, wave, sum(21, times(45, listed, spinCount))),
  times(series, states, listed, sum(12, perPosition)),
  times(4, valleyCount, states),
  256,
);
const payloads = sum(
  times(series, wave, sum(72, times(112, listed))),
  times(series, states, listed, perPosition),
  times(8, series, sum(times(2, energies), times(26, blocks))),
);
export const sliceBytes: Expression = sum(
  1_048_576,
  // grids, chains, one step's workspace and a banded solve
  times(finest, sum(850, times(300, isRing))),
  // vectors of the levels, on one grid at a time
  times(finest, solved, sum(8, times(8, isRing))),
  times(24, sum(200, times(400, solved))),
  times(2, least(states, longest), solved, perPosition),
  times(32, energies),
);
export const assembleBytes: Expression = sum(1_048_576, payloads, resultBytes, times(32, finest));
