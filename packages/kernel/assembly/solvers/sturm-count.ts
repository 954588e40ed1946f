/**
 * Sturm counts: how many eigenvalues of a real symmetric tridiagonal T lie below x, for eight x at once.
 *
 *   q[0] = d[0] − x,   q[i] = d[i] − x − e[i]²/q[i−1];   count = #{ i : q[i] < 0 }
 *
 * Source    W. Barth, R. S. Martin, J. H. Wilkinson, Numer. Math. 9 (1967) 386–393, in IEEE arithmetic without
 *           pivot guard as J. Demmel, I. Dhillon, H. Ren, ETNA 3 (1995) 116–149.
 * Input     d[n]; e2[n], e2[i] = square of the element between rows i−1 and i, e2[0] = 0, the others > 0; shifts[8].
 * Output    counts[8], i32, each 0…n.
 * Accuracy  Exact for a T whose e differ by a relative 2.5 ε and whose d − x are rounded once, so a count is uncertain
 *           only for x within a few ε‖T‖ of an eigenvalue. A zero pivot becomes an infinity and counts right.
 * Cost      8 n divisions in four f64x2 chains, which hide the division's latency; no memory.   Fails  never.
 */
export function sturmCounts(n: i32, d: usize, e2: usize, shifts: usize, counts: usize): void {
  const x0 = v128.load(shifts, 0);
  const x1 = v128.load(shifts, 16);
  const x2 = v128.load(shifts, 32);
  const x3 = v128.load(shifts, 48);
  let q0 = f64x2.splat(1);
  let q1 = q0;
  let q2 = q0;
  let q3 = q0;
  let c0 = i64x2.splat(0);
  let c1 = c0;
  let c2 = c0;
  let c3 = c0;
  for (let at: usize = 0, end = <usize>n << 3; at < end; at += 8) {
    const diagonal = v128.load64_splat(d + at);
    const coupling = v128.load64_splat(e2 + at);
    q0 = f64x2.sub(f64x2.sub(diagonal, x0), f64x2.div(coupling, q0));
    q1 = f64x2.sub(f64x2.sub(diagonal, x1), f64x2.div(coupling, q1));
    q2 = f64x2.sub(f64x2.sub(diagonal, x2), f64x2.div(coupling, q2));
    q3 = f64x2.sub(f64x2.sub(diagonal, x3), f64x2.div(coupling, q3));
    c0 = i64x2.add(c0, i64x2.shr_u(q0, 63));
    c1 = i64x2.add(c1, i64x2.shr_u(q1, 63));
    c2 = i64x2.add(c2, i64x2.shr_u(q2, 63));
    c3 = i64x2.add(c3, i64x2.shr_u(q3, 63));
  }
  storeCounts(counts, c0, c1, c2, c3);
}

/** Writes the low words of eight 64-bit counters. */
@inline
export function storeCounts(counts: usize, c0: v128, c1: v128, c2: v128, c3: v128): void {
  store<i32>(counts, <i32>i64x2.extract_lane(c0, 0), 0);
  store<i32>(counts, <i32>i64x2.extract_lane(c0, 1), 4);
  store<i32>(counts, <i32>i64x2.extract_lane(c1, 0), 8);
  store<i32>(counts, <i32>i64x2.extract_lane(c1, 1), 12);
  store<i32>(counts, <i32>i64x2.extract_lane(c2, 0), 16);
  store<i32>(counts, <i32>i64x2.extract_lane(c2, 1), 20);
  store<i32>(counts, <i32>i64x2.extract_lane(c3, 0), 24);
  store<i32>(counts, <i32>i64x2.extract_lane(c3, 1), 28);
}
