import type { CellsMark } from './plot.ts';
import { rampStep } from './ramp.ts';

/** Step of an empty pixel: no cell there, or a value that is not a number. */
export const emptyStep = 255;

/** Borders of cells around centres: half-way between neighbours, the outer ones mirrored. */
export function cellEdges(centres: ArrayLike<number>): Float64Array {
  const n = centres.length;
  const edges = new Float64Array(n + 1);
  const at = (i: number) => centres[i] as number;
  if (n === 1) {
    edges[0] = at(0) - 0.5;
    edges[1] = at(0) + 0.5;
    return edges;
  }
  for (let i = 1; i < n; i++) edges[i] = (at(i - 1) + at(i)) / 2;
  edges[0] = at(0) - (at(1) - at(0)) / 2;
  edges[n] = at(n - 1) + (at(n - 1) - at(n - 2)) / 2;
  return edges;
}

/** For each of `pixels` equal parts of the domain the first and last cell it meets; -1 where there is none. */
function cellsOfPixels(edges: Float64Array, domain: readonly [number, number], pixels: number): Int32Array {
  const ranges = new Int32Array(2 * pixels).fill(-1);
  const last = edges.length - 2;
  const step = (domain[1] - domain[0]) / pixels;
  let cell = 0;
  for (let p = 0; p < pixels; p++) {
    const low = domain[0] + p * step;
    const high = low + step;
    const middle = low + step / 2;
    if (middle < (edges[0] as number) || middle > (edges[last + 1] as number)) continue;
    while (cell < last && (edges[cell + 1] as number) <= low) cell++;
    let first = cell;
    let end = cell;
    while (end < last && (edges[end + 1] as number) < high) end++;
    if (end - first < 2) {
      // fewer cells than pixels: the one under the pixel's middle, so that borders stay sharp
      while (first < end && (edges[first + 1] as number) <= middle) first++;
      end = first;
    }
    ranges[2 * p] = first;
    ranges[2 * p + 1] = end;
  }
  return ranges;
}

/**
 * Colour steps of `width × height` pixels over the visible domains, row by row from the top. Where several cells fall
 * into one pixel their mean decides, so that a narrow line fades instead of vanishing between pixels.
 */
export function rasterizeCells(
  cells: CellsMark,
  xDomain: readonly [number, number],
  yDomain: readonly [number, number],
  width: number,
  height: number,
): Uint8Array {
  const columns = cellsOfPixels(cellEdges(cells.x), xDomain, width);
  const rows = cellsOfPixels(cellEdges(cells.y), yDomain, height);
  const out = new Uint8Array(width * height).fill(emptyStep);
  const ny = cells.y.length;
  for (let row = 0; row < height; row++) {
    const y0 = rows[2 * row] as number;
    const y1 = rows[2 * row + 1] as number;
    if (y0 < 0) continue;
    const offset = (height - 1 - row) * width;
    for (let column = 0; column < width; column++) {
      const x0 = columns[2 * column] as number;
      if (x0 < 0) continue;
      const x1 = columns[2 * column + 1] as number;
      let sum = 0;
      let count = 0;
      for (let ix = x0; ix <= x1; ix++)
        for (let iy = y0; iy <= y1; iy++) {
          const value = cells.values[ix * ny + iy] as number;
          if (!Number.isNaN(value)) {
            sum += value;
            count++;
          }
        }
      if (count > 0) out[offset + column] = rampStep(sum / count, cells.domain);
    }
  }
  return out;
}
