/**
 * LU with partial pivoting of H − x for a complex Hermitian band matrix, and its solve.
 *
 * Source    G. H. Golub, C. F. Van Loan, Matrix Computations (Johns Hopkins 2013) §4.3.5.
 * Input     a sealed band of half-bandwidth w; workspace of bandSolveBytes(n, w).
 * Output    solveBand overwrites y (n complex entries) by (H − x)⁻¹ y.
 * Accuracy  backward stable in practice (growth of partial pivoting on bands).
 * Cost      factor 8 n w (2w + 1), solve 8 n (3w + 1) operations.
 * Fails     never: a zero pivot becomes ε‖H‖, which is what inverse iteration wants.
 */
import { EPSILON } from "../constants";
import { BandMatrix, entryAt } from "./band-matrix";

export function bandSolveBytes(n: i32, width: i32): u64 {
  return <u64>n * <u64>(3 * width + 1) * 16 + <u64>n * 8 + <u64>(width + 1) * <u64>(2 * width + 1) * 16 + 64;
}

/** Layout: U rows (2w+1 entries), then L rows (w multipliers), then pivot offsets i32, then the working rows. */
@inline
function lower(n: i32, w: i32, workspace: usize): usize {
  return workspace + <usize>n * <usize>(2 * w + 1) * 16;
}
@inline
function pivots(n: i32, w: i32, workspace: usize): usize {
  return lower(n, w, workspace) + <usize>n * <usize>w * 16;
}

export function factorBand(band: BandMatrix, x: f64, workspace: usize): void {
  const n = band.n;
  const w = band.width;
  const span = 2 * w + 1;
  const rowBytes = <usize>span * 16;
  const upper = workspace;
  const multipliers = lower(n, w, workspace);
  const pivot = pivots(n, w, workspace);
  const rows = (pivot + <usize>n * 4 + 15) & ~15;
  const floor = EPSILON * (band.norm + Math.abs(x));
  // working row r (0 … w) holds row j + r from column j on
  for (let r = 0; r <= w; r++) loadRow(band, r, 0, x, rows + <usize>r * rowBytes, span);
  for (let j = 0; j < n; j++) {
    const active = min(w, n - 1 - j);
    let best = 0;
    let largest: f64 = -1;
    for (let r = 0; r <= active; r++) {
      const p = rows + <usize>r * rowBytes;
      const size = load<f64>(p) * load<f64>(p) + load<f64>(p, 8) * load<f64>(p, 8);
      if (size > largest) {
        largest = size;
        best = r;
      }
    }
    store<i32>(pivot + (<usize>j << 2), best);
    const u = upper + <usize>j * rowBytes;
    memory.copy(u, rows + <usize>best * rowBytes, rowBytes);
    if (best != 0) memory.copy(rows + <usize>best * rowBytes, rows, rowBytes);
    if (!(largest > floor * floor)) {
      store<f64>(u, floor);
      store<f64>(u, 0, 8);
    }
    const ur = load<f64>(u), ui = load<f64>(u, 8);
    const scale = 1 / (ur * ur + ui * ui);
    const inverseRe = ur * scale, inverseIm = -ui * scale;
    for (let r = 1; r <= active; r++) {
      const from = rows + <usize>r * rowBytes;
      const to = from - rowBytes;
      const a = load<f64>(from), b = load<f64>(from, 8);
      const mr = a * inverseRe - b * inverseIm, mi = a * inverseIm + b * inverseRe;
      const l = multipliers + <usize>(j * w + r - 1) * 16;
      store<f64>(l, mr);
      store<f64>(l, mi, 8);
      for (let c: usize = 16; c < rowBytes; c += 16) {
        const vr = load<f64>(u + c), vi = load<f64>(u + c, 8);
        store<f64>(to + c - 16, load<f64>(from + c) - (mr * vr - mi * vi));
        store<f64>(to + c - 16, load<f64>(from + c, 8) - (mr * vi + mi * vr), 8);
      }
      store<f64>(to + rowBytes - 16, 0);
      store<f64>(to + rowBytes - 16, 0, 8);
    }
    if (j + 1 + w < n) loadRow(band, j + 1 + w, j + 1, x, rows + <usize>w * rowBytes, span);
  }
}

/** Row i of H − x from column `from` on, `span` entries. */
function loadRow(band: BandMatrix, i: i32, from: i32, x: f64, to: usize, span: i32): void {
  for (let c = 0; c < span; c++, to += 16) {
    const j = from + c;
    let re: f64 = 0;
    let im: f64 = 0;
    if (i < band.n && j < band.n) {
      if (i >= j && i - j <= band.width) {
        re = load<f64>(entryAt(band, i, j));
        im = load<f64>(entryAt(band, i, j), 8);
      } else if (j > i && j - i <= band.width) {
        re = load<f64>(entryAt(band, j, i));
        im = -load<f64>(entryAt(band, j, i), 8);
      }
      if (i == j) re -= x;
    }
    store<f64>(to, re);
    store<f64>(to, im, 8);
  }
}

export function solveBand(band: BandMatrix, workspace: usize, y: usize): void {
  const n = band.n;
  const w = band.width;
  const span = 2 * w + 1;
  const multipliers = lower(n, w, workspace);
  const pivot = pivots(n, w, workspace);
  for (let j = 0; j < n; j++) {
    const here = y + (<usize>j << 4);
    const other = here + (<usize>load<i32>(pivot + (<usize>j << 2)) << 4);
    const vr = load<f64>(other), vi = load<f64>(other, 8);
    store<f64>(other, load<f64>(here));
    store<f64>(other, load<f64>(here, 8), 8);
    store<f64>(here, vr);
    store<f64>(here, vi, 8);
    const active = min(w, n - 1 - j);
    for (let r = 1; r <= active; r++) {
      const l = multipliers + <usize>(j * w + r - 1) * 16;
      const mr = load<f64>(l), mi = load<f64>(l, 8);
      const to = here + (<usize>r << 4);
      store<f64>(to, load<f64>(to) - (mr * vr - mi * vi));
      store<f64>(to, load<f64>(to, 8) - (mr * vi + mi * vr), 8);
    }
  }
  for (let j = n - 1; j >= 0; j--) {
    const here = y + (<usize>j << 4);
    const u = workspace + <usize>j * <usize>span * 16;
    let re = load<f64>(here), im = load<f64>(here, 8);
    const reach = min(span - 1, n - 1 - j);
    for (let c = 1; c <= reach; c++) {
      const ar = load<f64>(u + (<usize>c << 4)), ai = load<f64>(u + (<usize>c << 4), 8);
      const vr = load<f64>(here + (<usize>c << 4)), vi = load<f64>(here + (<usize>c << 4), 8);
      re -= ar * vr - ai * vi;
      im -= ar * vi + ai * vr;
    }
    const ur = load<f64>(u), ui = load<f64>(u, 8);
    const scale = 1 / (ur * ur + ui * ui);
    store<f64>(here, (re * ur + im * ui) * scale);
    store<f64>(here, (im * ur - re * ui) * scale, 8);
  }
}
