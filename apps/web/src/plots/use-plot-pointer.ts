import type { Geometry } from '@nightcone/drawing';
import { type PointerEvent, type RefObject, useEffect, useState } from 'react';
import type { PlotWindow } from './use-plot-window.ts';

interface Drag {
  fromX: number;
  fromY: number;
  x: number;
  y: number;
  pan: boolean;
}

/** Place of a pointer in px of the drawing. */
const placeOf = (element: Element, event: { clientX: number; clientY: number }) => {
  const box = element.getBoundingClientRect();
  return { x: event.clientX - box.left, y: event.clientY - box.top };
};

/**
 * Pointer on a plot: moving reads, dragging brushes a window, dragging with Shift moves, a double click shows all. The
 * wheel zooms once the plot has the focus or with Ctrl or ⌘, so that it never stops a page from scrolling.
 */
export function usePlotPointer(
  ref: RefObject<HTMLElement | null>,
  geometry: Geometry,
  view: PlotWindow,
  onHover: (place: { x: number; y: number } | null) => void,
  /** Too many marks to draw again at every step: the drawing is moved as a picture and made anew at rest. */
  atRest: boolean,
) {
  const [drag, setDrag] = useState<Drag | null>(null);
  useEffect(() => {
    const element = ref.current;
    if (!element) return;
    const onWheel = (event: WheelEvent) => {
      if (!event.ctrlKey && !event.metaKey && document.activeElement !== element) return;
      event.preventDefault();
      const { x, y } = placeOf(element, event);
      view.zoomAt(geometry, x, y, Math.exp(Math.max(-0.5, Math.min(0.5, event.deltaY * 0.002))));
    };
    // React's own wheel listener is passive and could not keep the page still
    element.addEventListener('wheel', onWheel, { passive: false });
    return () => element.removeEventListener('wheel', onWheel);
  }, [ref, geometry, view]);

  const brush = drag && !drag.pan && Math.abs(drag.x - drag.fromX) + Math.abs(drag.y - drag.fromY) > 6 ? drag : null;
  return {
    brush: brush && boxOf(brush, geometry),
    shift: drag?.pan && atRest ? { x: drag.x - drag.fromX, y: drag.y - drag.fromY } : null,
    handlers: {
      onPointerDown(event: PointerEvent<HTMLElement>) {
        if (event.button !== 0 || event.pointerType === 'touch') return;
        const { x, y } = placeOf(event.currentTarget, event);
        event.currentTarget.setPointerCapture?.(event.pointerId);
        setDrag({ fromX: x, fromY: y, x, y, pan: event.shiftKey });
      },
      onPointerMove(event: PointerEvent<HTMLElement>) {
        const { x, y } = placeOf(event.currentTarget, event);
        if (!drag) {
          onHover({ x, y });
          return;
        }
        if (drag.pan && !atRest) view.panBy(geometry, drag.x - x, drag.y - y);
        setDrag({ ...drag, x, y });
      },
      onPointerUp() {
        if (brush) {
          const box = boxOf(brush, geometry);
          view.show({
            x: [geometry.fromX(box.x), geometry.fromX(box.x + box.width)],
            y: [geometry.fromY(box.y + box.height), geometry.fromY(box.y)],
          });
        }
        if (drag?.pan && atRest) view.panBy(geometry, drag.fromX - drag.x, drag.fromY - drag.y);
        setDrag(null);
      },
      onPointerLeave() {
        if (!drag) onHover(null);
      },
      onDoubleClick: view.reset,
    },
  };
}

/** The brushed rectangle inside the data; a flat drag takes the whole height, a steep one the whole width. */
function boxOf(drag: Drag, { data }: Geometry) {
  const clampX = (x: number) => Math.min(data.x + data.width, Math.max(data.x, x));
  const clampY = (y: number) => Math.min(data.y + data.height, Math.max(data.y, y));
  const [x0, x1] = [drag.fromX, drag.x].map(clampX).sort((a, b) => a - b) as [number, number];
  const [y0, y1] = [drag.fromY, drag.y].map(clampY).sort((a, b) => a - b) as [number, number];
  const flat = y1 - y0 < 12;
  const steep = x1 - x0 < 12 && !flat;
  return {
    x: steep ? data.x : x0,
    y: flat ? data.y : y0,
    width: steep ? data.width : Math.max(1, x1 - x0),
    height: flat ? data.height : Math.max(1, y1 - y0),
  };
}
