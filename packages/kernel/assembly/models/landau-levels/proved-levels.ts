/**
 * Levels of an open chain by index; a level whose proved interval holds 0 is 0 (zero modes are exact in these chains,
 * the solver's pivot floor would leave 1e-200).
 */
import { at, put } from "../../doubles";
import { Chain } from "../../solvers/chain";
import { levelValues } from "../../solvers/chain-levels";

/** Fills values and the half widths of their proved intervals; false when the counts do not close. */
export function provedLevels(chain: Chain, first: i32, count: i32, values: usize, errors: usize): bool {
  if (!levelValues(chain, first, count, values, errors)) return false;
  for (let i = 0; i < count; i++) if (Math.abs(at(values, i)) <= at(errors, i)) put(values, i, 0);
  return true;
}
