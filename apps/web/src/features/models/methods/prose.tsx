import { numbered } from '../../../plots/numbered.ts';
import { Formula } from './formula.tsx';
import { splitProse } from './split-prose.ts';

/** Physics in the serif face, its formulas set. */
export function Prose({ text }: { text: string }) {
  return (
    <div className="max-w-[46rem] font-serif text-[1.03125rem] leading-6">
      {numbered(splitProse(text)).map(({ key, item: parts }) => (
        <div key={key} className="mt-2.5">
          {numbered(parts).map(({ key: place, item }) =>
            item.kind === 'text' ? (
              <span key={place}>{item.text}</span>
            ) : item.kind === 'strong' ? (
              <strong key={place}>{item.text}</strong>
            ) : (
              <Formula key={place} tex={item.text} display={item.kind === 'display'} />
            ),
          )}
        </div>
      ))}
    </div>
  );
}
