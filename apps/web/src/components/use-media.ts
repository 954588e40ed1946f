import { useSyncExternalStore } from 'react';

/** Does the page match a media query now? */
export function useMedia(query: string): boolean {
  return useSyncExternalStore(
    (changed) => {
      const list = matchMedia(query);
      list.addEventListener('change', changed);
      return () => list.removeEventListener('change', changed);
    },
    () => matchMedia(query).matches,
  );
}

/** The margin column stands beside the sheet (the breakpoint `margin` of the theme). */
export const besideSheet = '(min-width: 68rem)';
