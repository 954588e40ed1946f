import { ceilOver, is, isNotZero, minus, most, read, sum, times } from '../../build-expression.ts';
import type { Expression } from '../../expression.ts';

/**
 * Sizes and costs of a job, as trees over its record. They follow the kernel's own row layout and cost model
 * (assembly/models/landau-levels/row.ts and cost.ts); a test compares the two.
 */
const fields = read('/parameters/fieldT');
const energies = read('/parameters/energyEv');
const carriers = read('/parameters/carrierPerNm2');
const maxIndex = read('/parameters/levels');
const isBilayer = is('/parameters/system', 'bilayer');
const hasLines = minus(1, is('/parameters/broadening', 'none'));
const valleyCount = sum(1, is('/parameters/valleys', 'both'));
const spinCount = sum(1, is('/parameters/spin', 'zeeman'));

const levels = sum(times(2, maxIndex), 1, isBilayer);
const transitions = times(4, maxIndex);
const listed = times(valleyCount, spinCount, levels);
const perValley = times(valleyCount, levels);

/** Doubles of one field's row. */
const row = sum(
  listed,
  times(2, perValley),
  times(sum(2, hasLines), energies),
  times(3, carriers),
  times(2, valleyCount, transitions),
  3,
);

export const FIELDS_PER_SLICE = 16;
export const sliceCount: Expression = ceilOver(fields, FIELDS_PER_SLICE);

const payloads = times(8, row, fields);
const perFieldBytes = sum(
  times(9, listed),
  times(8, perValley),
  times(9, sum(2, hasLines), energies),
  times(18, carriers),
  times(9, valleyCount, transitions),
  25,
);
/** Axes and labels, which do not repeat with the field. */
const labelBytes = sum(times(8, energies), times(8, carriers), times(4, levels), times(8, transitions), 16);
export const resultBytes: Expression = sum(times(fields, perFieldBytes), labelBytes);
export const sliceBytes: Expression = sum(1_048_576, times(8 * FIELDS_PER_SLICE, row), times(8192, levels));
export const assembleBytes: Expression = sum(1_048_576, payloads, resultBytes, times(8192, levels));

const usesGrid = is('/numerics/method', 'grid');
const usesLadder = is('/numerics/method', 'ladder');
const hasSkewHopping = isNotZero('/parameters/system/v3Ratio');
const choosesLadder = times(is('/numerics/method', 'auto'), hasSkewHopping);
const usesClosedForm = minus(1, sum(usesGrid, usesLadder, choosesLadder));
const isMonolayer = minus(1, isBilayer);

/** Nanoseconds for the levels of one valley, by method. */
const ladderSize = sum(read('/numerics/method/size'), times(1.5, choosesLadder, most(32, times(2, maxIndex))));
const bilayerLadder = sum(
  times(12, ladderSize, sum(400, times(20, levels))),
  times(150, isNotZero('/parameters/system/v4Ratio'), ladderSize, ladderSize),
);
const valleyCost = sum(
  times(
    usesClosedForm,
    sum(times(isBilayer, 1200, sum(maxIndex, 2)), times(isMonolayer, sum(times(30, maxIndex), 100))),
  ),
  times(
    7,
    read('/numerics/method/boxMagneticLengths'),
    read('/numerics/method/cellsPerMagneticLength'),
    sum(300, times(50, levels)),
  ),
  times(usesLadder, isMonolayer, 80, levels, sum(times(2, ladderSize), 1)),
  times(isBilayer, sum(usesLadder, choosesLadder), bilayerLadder),
);

/** Nanoseconds for the occupied part of one level at one energy. */
const isWarm = isNotZero('/parameters/temperatureK');
const occupiedCost = sum(
  times(is('/parameters/broadening', 'lorentzian'), sum(10, times(25, isWarm))),
  times(is('/parameters/broadening', 'gaussian'), 10),
  times(is('/parameters/broadening', 'none'), sum(1, times(7, isWarm))),
);
const valleysDiffer = times(isBilayer, isNotZero('/parameters/system/biasEv'));
const distinct = times(spinCount, levels, sum(1, times(valleysDiffer, minus(valleyCount, 1))));
const held = times(
  distinct,
  sum(times(energies, sum(occupiedCost, 2, times(5, hasLines))), times(7, carriers, occupiedCost)),
);

export const cost: Expression = times(fields, sum(times(valleyCount, valleyCost), held, times(2, row), 1500));
export const assembleCost: Expression = sum(times(12, row, fields), 400_000);
