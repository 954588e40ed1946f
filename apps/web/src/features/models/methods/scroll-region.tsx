import type { ReactNode } from 'react';

/** A wide table in a narrow page: it scrolls sideways inside its place, by keys too. */
export function ScrollRegion({ label, children }: { label: string; children: ReactNode }) {
  return (
    // biome-ignore lint/a11y/noNoninteractiveTabindex: a scrolled region must be reachable by keys
    <section aria-label={label} tabIndex={0} className="overflow-x-auto">
      {children}
    </section>
  );
}
