import { symbolRuns, type TextRun } from '@nightcone/drawing';
import { numbered } from './numbered.ts';

/** A symbol of physics in the serif face, from its TeX, without a formula engine. */
export function SymbolText({ tex, className = '' }: { tex: string; className?: string }) {
  return (
    <span className={`whitespace-nowrap font-serif text-[1.1em] ${className}`}>
      {numbered(symbolRuns(tex)).map(({ key, item: run }) => {
        const Shift = run.shift === 'sub' ? 'sub' : run.shift === 'super' ? 'sup' : 'span';
        return (
          <Shift key={key} className={run.shift ? 'text-[0.72em]' : ''}>
            {run.italic ? <i>{run.text}</i> : run.text}
          </Shift>
        );
      })}
    </span>
  );
}

/** The same inside a drawing, with the unit behind it. */
export function SymbolSpans({ runs, unit }: { runs: readonly TextRun[]; unit: string }) {
  return (
    <>
      {numbered(runs).map(({ key, item: run }) => (
        <tspan
          key={key}
          fontStyle={run.italic ? 'italic' : 'normal'}
          {...(run.shift ? { fontSize: 11, baselineShift: run.shift } : {})}
        >
          {run.text}
        </tspan>
      ))}
      {unit ? (
        <tspan fontSize={13} className="fill-ink2">
          {` (${unit})`}
        </tspan>
      ) : null}
    </>
  );
}
