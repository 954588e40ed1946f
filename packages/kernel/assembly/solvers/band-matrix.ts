/**
 * Complex Hermitian band matrix, lower triangle by columns: entry d of column j is H[j+d][j], d = 0 … width.
 *
 *   address = entries + ((j·(width + 1) + d)·16), re and im; the diagonal's im is 0; entries below the last row are 0.
 */
import { reserve, reserveZeroed } from "../arena";

@unmanaged
export class BandMatrix {
  n: i32;
  /** Half-bandwidth: H[i][j] = 0 for |i − j| > width. */
  width: i32;
  entries: usize;
  /** Largest row sum of absolute values, made by sealBand: a bound of ‖H‖. */
  norm: f64;
}

/** An n × n zero matrix. */
export function newBand(n: i32, width: i32): BandMatrix {
  const band = changetype<BandMatrix>(reserve(offsetof<BandMatrix>()));
  band.n = n;
  band.width = width;
  band.entries = reserveZeroed(<u64>n * <u64>(width + 1) * 16);
  band.norm = 0;
  return band;
}

@inline
export function entryAt(band: BandMatrix, row: i32, column: i32): usize {
  return band.entries + (<usize>(column * (band.width + 1) + row - column) << 4);
}

/** Writes H[row][column] for row ≥ column, row − column ≤ width; the upper triangle follows by Hermitian symmetry. */
export function setEntry(band: BandMatrix, row: i32, column: i32, re: f64, im: f64): void {
  const to = entryAt(band, row, column);
  store<f64>(to, re);
  store<f64>(to, im, 8);
}

/** Row sums of absolute values; call once after the last entry. */
export function sealBand(band: BandMatrix): void {
  let norm: f64 = 0;
  for (let i = 0; i < band.n; i++) {
    let sum: f64 = 0;
    for (let j = max(0, i - band.width); j <= min(band.n - 1, i + band.width); j++) {
      const from = i >= j ? entryAt(band, i, j) : entryAt(band, j, i);
      sum += Math.sqrt(load<f64>(from) * load<f64>(from) + load<f64>(from, 8) * load<f64>(from, 8));
    }
    if (sum > norm) norm = sum;
  }
  band.norm = norm;
}

/** y = H x; n complex entries each. */
export function applyBand(band: BandMatrix, x: usize, y: usize): void {
  const n = band.n;
  memory.fill(y, 0, <usize>n << 4);
  for (let j = 0; j < n; j++) {
    const xr = load<f64>(x + (<usize>j << 4));
    const xi = load<f64>(x + (<usize>j << 4), 8);
    let from = entryAt(band, j, j);
    let sumRe = load<f64>(from) * xr;
    let sumIm = load<f64>(from) * xi;
    const last = min(n - 1, j + band.width);
    for (let i = j + 1; i <= last; i++) {
      from += 16;
      const re = load<f64>(from), im = load<f64>(from, 8);
      const p = <usize>i << 4;
      store<f64>(y + p, load<f64>(y + p) + re * xr - im * xi);
      store<f64>(y + p, load<f64>(y + p, 8) + re * xi + im * xr, 8);
      const vr = load<f64>(x + p), vi = load<f64>(x + p, 8);
      sumRe += re * vr + im * vi; // conj(H[i][j]) x[i]
      sumIm += re * vi - im * vr;
    }
    const p = <usize>j << 4;
    store<f64>(y + p, load<f64>(y + p) + sumRe);
    store<f64>(y + p, load<f64>(y + p, 8) + sumIm, 8);
  }
}
