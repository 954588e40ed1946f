import { type ReactNode, useEffect } from 'react';

/** Heading of a page with its document title. `lead` stands under the heading, `actions` at its right. */
export function Page({
  title,
  heading,
  kicker,
  lead,
  actions,
  wide = false,
  children,
}: {
  /** For the browser's tab. */
  title: string;
  heading?: ReactNode;
  kicker?: ReactNode;
  lead?: ReactNode;
  actions?: ReactNode;
  /** The heading spans sheet and margin column (Tonight). */
  wide?: boolean;
  children?: ReactNode;
}) {
  useEffect(() => {
    document.title = title === 'Nightcone' ? title : `${title} · Nightcone`;
  }, [title]);
  return (
    <div className="pt-3 pb-10">
      <div className={wide ? '' : 'margin:grid margin:grid-cols-[minmax(0,1fr)_308px] margin:gap-x-11'}>
        <header className="flex flex-wrap items-end justify-between gap-x-8 gap-y-3 margin:flex-nowrap">
          <div className="min-w-0">
            {kicker ? <p className="num text-ink3 text-small">{kicker}</p> : null}
            <h1 id="page-heading" tabIndex={-1} className="outline-none [overflow-wrap:anywhere]">
              {heading ?? title}
            </h1>
            {lead ? (
              <div className="mt-1 flex flex-wrap items-center gap-x-5 gap-y-1 text-ink2 text-small">{lead}</div>
            ) : null}
          </div>
          {actions ? (
            <div className="flex flex-wrap items-center gap-x-5 gap-y-2 margin:shrink-0 margin:flex-nowrap max-sm:w-full">
              {actions}
            </div>
          ) : null}
        </header>
        <div
          aria-hidden
          className={`${wide ? '' : 'margin:block '}relative hidden margin:before:absolute margin:before:top-0 margin:before:bottom-0 margin:before:-left-5 margin:before:w-px margin:before:bg-hair`}
        />
      </div>
      {children}
    </div>
  );
}
