/**
 * Sorts doubles ascending, in place.
 *
 * Source    J. W. J. Williams, Algorithm 232, Commun. ACM 7 (1964) 347–348.
 * Input     n doubles without NaN; −0 and 0 are equal.
 * Cost      2 n log₂ n comparisons, no memory.   Fails  never.
 */
export function heapSort(values: usize, n: i32): void {
  for (let root = (n >> 1) - 1; root >= 0; root--) siftDown(values, root, n);
  for (let last = n - 1; last > 0; last--) {
    const top = load<f64>(values);
    store<f64>(values, load<f64>(values + (<usize>last << 3)));
    store<f64>(values + (<usize>last << 3), top);
    siftDown(values, 0, last);
  }
}

function siftDown(values: usize, root: i32, n: i32): void {
  const moved = load<f64>(values + (<usize>root << 3));
  for (let child = 2 * root + 1; child < n; child = 2 * root + 1) {
    let at = values + (<usize>child << 3);
    if (child + 1 < n && load<f64>(at, 8) > load<f64>(at)) {
      child++;
      at += 8;
    }
    if (load<f64>(at) <= moved) break;
    store<f64>(values + (<usize>root << 3), load<f64>(at));
    root = child;
  }
  store<f64>(values + (<usize>root << 3), moved);
}
