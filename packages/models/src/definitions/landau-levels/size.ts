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
export const resultBytes: Expression = times(
  fields,
  sum(
    times(9, listed),
    times(8, perValley),
    times(9, sum(2, hasLines), energies),
    times(18, carriers),
    times(9, valleyCount, transitions),
    17,
  ),
);
export const sliceBytes: Expression = sum(1_048_576, times(8 * FIELDS_PER_SLICE, row), times(8192, levels));
export const assembleBytes: Expression = sum(1_048_576, payloads, resultBytes, times(8192, levels));

const usesLadder = is('/numerics/method', 'ladder');
const usesGrid = is('/numerics/method', 'grid');

export const cost: Expression = 1;
export const assembleCost: Expression = 1;
export { carriers, energies, fields, hasLines, isNotZero, most, usesGrid, usesLadder };
