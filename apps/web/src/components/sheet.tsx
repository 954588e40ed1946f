import type { ReactNode } from 'react';

/**
 * The page form: the sheet holds the work, the margin column (308 px) the evidence that goes with the line beside it.
 * Rows follow each other without gaps, so the margin rule is one line. On a narrow screen the margin folds under its row.
 */
export function SheetRow({
  children,
  margin,
  divided = false,
}: {
  children: ReactNode;
  margin?: ReactNode;
  /** A hairline above, from the sheet's edge to the margin rule. */
  divided?: boolean;
}) {
  return (
    <div className="margin:grid margin:grid-cols-[minmax(0,1fr)_308px] margin:gap-x-11">
      <div
        className={`relative min-w-0 py-4 ${divided ? 'before:absolute before:top-0 before:left-0 before:right-0 before:h-px before:bg-hair margin:before:-right-6' : ''}`}
      >
        {children}
      </div>
      <div className="relative pb-2 margin:py-4 margin:before:absolute margin:before:top-0 margin:before:bottom-0 margin:before:-left-5 margin:before:w-px margin:before:bg-hair">
        {margin ? <div className="flex flex-col gap-7">{margin}</div> : null}
      </div>
    </div>
  );
}

/** One entry of the margin. It hangs from an 18 px ink tick that crosses the rule at its first line. */
export function MarginEntry({
  title,
  level = 'minor',
  letter,
  children,
}: {
  title: ReactNode;
  /** `major` stands beside a section of its own (upright), `minor` comments on the line (italic). */
  level?: 'major' | 'minor';
  /** Shared with the line it belongs to, where a preview stands between them. */
  letter?: string;
  children?: ReactNode;
}) {
  const Heading = level === 'major' ? 'h2' : 'h3';
  return (
    <section className="relative max-margin:border-l max-margin:border-ink max-margin:pl-3.5">
      <span
        aria-hidden
        className="absolute top-[0.7rem] -left-[26px] hidden h-px w-[18px] bg-ink margin:block"
        data-tick=""
      />
      <Heading>
        {letter ? <i className="symbol mr-2 hidden font-semibold margin:inline">{letter}</i> : null}
        {title}
      </Heading>
      {children}
    </section>
  );
}

/** Name on the left, number on the right, a hairline under each. */
export function Facts({ rows }: { rows: readonly { name: ReactNode; value: ReactNode; key?: string }[] }) {
  return (
    <dl className="text-small">
      {rows.map((row, index) => (
        <div
          key={row.key ?? (typeof row.name === 'string' ? row.name : index)}
          className="flex items-baseline justify-between gap-4 border-b border-hair py-[5px] last:border-b-0"
        >
          <dt>{row.name}</dt>
          <dd className="num text-right [overflow-wrap:anywhere]">{row.value}</dd>
        </div>
      ))}
    </dl>
  );
}
