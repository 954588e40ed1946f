import type { Domains, Geometry, Plot } from '@nightcone/drawing';
import { useCallback, useState } from 'react';

type Span = readonly [number, number];

/** A span scaled around a fixed place; never wider than the whole, never narrower than a millionth of it. */
export function zoomSpan([low, high]: Span, whole: Span, at: number, factor: number): Span {
  const width = Math.min(whole[1] - whole[0], Math.max((whole[1] - whole[0]) * 1e-6, (high - low) * factor));
  const part = (at - low) / (high - low);
  return shiftInto([at - part * width, at + (1 - part) * width], whole);
}

/** The span moved so that it lies inside the whole. */
export function shiftInto([low, high]: Span, whole: Span): Span {
  const shift = low < whole[0] ? whole[0] - low : high > whole[1] ? whole[1] - high : 0;
  return [low + shift, high + shift];
}

export interface PlotWindow {
  domains: Domains | undefined;
  zoomed: boolean;
  zoomAt(geometry: Geometry, x: number, y: number, factor: number): void;
  panBy(geometry: Geometry, dx: number, dy: number): void;
  show(domains: Domains): void;
  reset(): void;
}

/** The visible part of a plot. It survives new data as long as the plot's own domains stay. */
export function usePlotWindow(plot: Plot): PlotWindow {
  const whole: Domains = { x: plot.x.domain, y: plot.y.domain };
  const key = [...whole.x, ...whole.y, plot.x.symbol, plot.y.symbol].join(' ');
  const [state, setState] = useState<{ key: string; domains: Domains } | null>(null);
  const domains = state?.key === key ? state.domains : undefined;
  const show = useCallback((next: Domains) => setState({ key, domains: next }), [key]);
  const reset = useCallback(() => setState(null), []);
  return {
    domains,
    zoomed: domains !== undefined,
    show,
    reset,
    zoomAt(geometry, x, y, factor) {
      const next = {
        x: zoomSpan(geometry.domains.x, whole.x, geometry.fromX(x), factor),
        y: zoomSpan(geometry.domains.y, whole.y, geometry.fromY(y), factor),
      };
      const all =
        next.x[1] - next.x[0] >= (whole.x[1] - whole.x[0]) * 0.9999 &&
        next.y[1] - next.y[0] >= (whole.y[1] - whole.y[0]) * 0.9999;
      if (all) reset();
      else show(next);
    },
    panBy(geometry, dx, dy) {
      const stepX = geometry.fromX(dx) - geometry.fromX(0);
      const stepY = geometry.fromY(dy) - geometry.fromY(0);
      show({
        x: shiftInto([geometry.domains.x[0] + stepX, geometry.domains.x[1] + stepX], whole.x),
        y: shiftInto([geometry.domains.y[0] + stepY, geometry.domains.y[1] + stepY], whole.y),
      });
    },
  };
}
