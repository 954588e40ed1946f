import type { LineMark } from './plot.ts';

/** Two decimals: a hundredth of a pixel is below sight and makes equal bytes out of equal drawings. */
export const round = (value: number): number => Math.round(value * 100) / 100 + 0;

export type ToPixels = (value: number) => number;

/**
 * SVG path of a line. With slopes each piece is the cubic through both ends with these slopes (Hermite data as a Bézier
 * curve: control points a third of the way along the tangents). NaN breaks the line; a lone point leaves nothing.
 */
export function linePath(line: LineMark, x: ToPixels, y: ToPixels, clip?: readonly [number, number]): string {
  const parts: string[] = [];
  const n = line.x.length;
  let open = false;
  const good = (i: number) => i >= 0 && i < n && !Number.isNaN(line.x[i]) && !Number.isNaN(line.y[i]);
  for (let i = 0; i < n; i++) {
    if (!good(i)) {
      open = false;
      continue;
    }
    const xi = line.x[i] as number;
    const yi = line.y[i] as number;
    if (!open) {
      if (good(i + 1) && visible(xi, line.x[i + 1] as number, clip)) {
        parts.push(`M${round(x(xi))},${round(y(yi))}`);
        open = true;
      }
      continue;
    }
    const x0 = line.x[i - 1] as number;
    const y0 = line.y[i - 1] as number;
    if (line.slopes) {
      const third = (xi - x0) / 3;
      const [s0, s1] = [line.slopes[i - 1] as number, line.slopes[i] as number];
      const c = [x(x0 + third), y(y0 + s0 * third), x(xi - third), y(yi - s1 * third), x(xi), y(yi)].map(round);
      parts.push(`C${c.join(',')}`);
    } else parts.push(`L${round(x(xi))},${round(y(yi))}`);
    if (good(i + 1) && !visible(xi, line.x[i + 1] as number, clip)) open = false;
  }
  return parts.join('');
}

const visible = (a: number, b: number, clip?: readonly [number, number]) =>
  !clip || (Math.max(a, b) >= clip[0] && Math.min(a, b) <= clip[1]);
