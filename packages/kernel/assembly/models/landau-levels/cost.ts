/** Estimated floating-point operations of one field, in units in which 10⁶ take about a millisecond. */
export function rowCost(): f64 {
  return 1;
}
