import type { Geometry } from '@nightcone/drawing';
import type { Targets } from './built-plot.ts';

/** The target nearest to a place in px that lies inside the visible window; null when none is within `reach`. */
export function nearestTarget(
  targets: Targets,
  geometry: Geometry,
  x: number,
  y: number,
  reach = Number.POSITIVE_INFINITY,
): number | null {
  const { domains } = geometry;
  // both scales are linear: px per unit once, instead of a call for each of up to 10⁵ places
  const x0 = geometry.fromX(x);
  const y0 = geometry.fromY(y);
  const perX = geometry.toX(1) - geometry.toX(0);
  const perY = geometry.toY(1) - geometry.toY(0);
  let best: number | null = null;
  let least = reach * reach;
  for (let i = 0; i < targets.x.length; i++) {
    const tx = targets.x[i] as number;
    const ty = targets.y[i] as number;
    if (!(tx >= domains.x[0] && tx <= domains.x[1] && ty >= domains.y[0] && ty <= domains.y[1])) continue;
    const distance = ((tx - x0) * perX) ** 2 + ((ty - y0) * perY) ** 2;
    if (distance < least) {
      least = distance;
      best = i;
    }
  }
  return best;
}

export type Direction = 'left' | 'right' | 'up' | 'down';

/** The next target in a direction: the nearest one on that side, where going sideways counts four times. */
export function nextTarget(targets: Targets, geometry: Geometry, from: number, direction: Direction): number {
  const { domains } = geometry;
  const x0 = geometry.toX(targets.x[from] as number);
  const y0 = geometry.toY(targets.y[from] as number);
  const horizontal = direction === 'left' || direction === 'right';
  const sign = direction === 'right' || direction === 'down' ? 1 : -1;
  let best = from;
  let least = Number.POSITIVE_INFINITY;
  for (let i = 0; i < targets.x.length; i++) {
    const tx = targets.x[i] as number;
    const ty = targets.y[i] as number;
    if (!(tx >= domains.x[0] && tx <= domains.x[1] && ty >= domains.y[0] && ty <= domains.y[1])) continue;
    const dx = geometry.toX(tx) - x0;
    const dy = geometry.toY(ty) - y0;
    const along = sign * (horizontal ? dx : dy);
    if (along < 0.01) continue;
    const distance = along + 4 * Math.abs(horizontal ? dy : dx);
    if (distance < least) {
      least = distance;
      best = i;
    }
  }
  return best;
}
