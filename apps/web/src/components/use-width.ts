import { type RefObject, useLayoutEffect, useRef, useState } from 'react';

/** Width of an element in CSS pixels, kept up to date: drawings are made for it, never stretched. */
export function useWidth<E extends Element>(first = 960): [ref: RefObject<E | null>, width: number] {
  const ref = useRef<E | null>(null);
  const [width, setWidth] = useState(first);
  useLayoutEffect(() => {
    const element = ref.current;
    if (!element) return;
    const measure = () => {
      const { width: now } = element.getBoundingClientRect();
      if (now > 0) setWidth(Math.round(now));
    };
    measure();
    if (typeof ResizeObserver !== 'function') return;
    const observer = new ResizeObserver(measure);
    observer.observe(element);
    return () => observer.disconnect();
  }, []);
  return [ref, width];
}
