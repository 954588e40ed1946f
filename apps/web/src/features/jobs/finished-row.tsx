import type { JobView } from '@nightcone/contracts';
import { lazy, Suspense, useLayoutEffect, useRef, useState } from 'react';
import { Loading } from '../../components/problem-note.tsx';
import { SheetRow } from '../../components/sheet.tsx';
import { besideSheet, useMedia } from '../../components/use-media.ts';
import type { Readout } from '../../plots/built-plot.ts';
import { SymbolText } from '../../plots/symbol-text.tsx';

const ResultPlot = lazy(async () => ({ default: (await import('../../plots/result-plot.tsx')).ResultPlot }));

/** From the sheet's edge over the margin rule to the read-out: 24 + 12 px. */
const reach = 36;
/** The first line of a read-out sits this far above its own middle. */
const halfLine = 14;

/** The plot; the horizontal line of its cross-hair is the tick of the read-out in the margin. */
export function FinishedRow({ job }: { job: JobView }) {
  const [readout, setReadout] = useState<Readout | null>(null);
  const sheet = useRef<HTMLDivElement>(null);
  const beside = useMedia(besideSheet);
  return (
    <SheetRow margin={<ReadoutZone readout={readout} sheet={sheet} />}>
      <div ref={sheet} className="min-h-130">
        <Suspense fallback={<Loading what="the plot" />}>
          <ResultPlot job={job} onReadout={setReadout} reach={beside ? reach : 0} />
        </Suspense>
      </div>
    </SheetRow>
  );
}

function ReadoutZone({ readout, sheet }: { readout: Readout | null; sheet: React.RefObject<HTMLDivElement | null> }) {
  const zone = useRef<HTMLDivElement>(null);
  const text = useRef<HTMLDivElement>(null);
  const [top, setTop] = useState(0);
  useLayoutEffect(() => {
    const plot = sheet.current?.querySelector('[data-plot]');
    if (!readout || !plot || !zone.current || !text.current) return;
    const offset = plot.getBoundingClientRect().top - zone.current.getBoundingClientRect().top;
    setTop(offset + readout.top - halfLine);
  }, [readout, sheet]);
  return (
    <div ref={zone} className="relative margin:h-0">
      <div
        ref={text}
        style={{ '--readout-top': `${top}px` } as React.CSSProperties}
        className="margin:absolute margin:top-(--readout-top) margin:left-0 margin:w-full max-margin:border-ink max-margin:border-l max-margin:pl-3.5"
      >
        {readout ? <ReadoutText readout={readout} /> : null}
      </div>
      {readout ? null : (
        <p className="text-ink3 text-small">
          Point at the plot to read a value with its error, or focus it and use the arrow keys.
        </p>
      )}
    </div>
  );
}

function ReadoutText({ readout }: { readout: Readout }) {
  return (
    <>
      <p className="num font-semibold text-[1.1875rem] leading-7">{readout.value}</p>
      <p className="mb-1 text-ink2 text-small">{readout.description}</p>
      <dl className="text-small">
        {readout.rows.map((row) => (
          <div
            key={row.label}
            className="flex items-baseline justify-between gap-4 border-hair border-b bg-ground py-[5px] last:border-b-0"
          >
            <dt>
              {row.symbol ? <SymbolText tex={row.symbol} /> : null} {row.label}
            </dt>
            <dd className="num text-right">{row.value}</dd>
          </div>
        ))}
      </dl>
    </>
  );
}
