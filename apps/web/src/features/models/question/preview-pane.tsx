import type { ModelDefinition } from '@nightcone/models';
import { useMemo, useState, useSyncExternalStore } from 'react';
import type { BuiltPlot } from '../../../plots/built-plot.ts';
import { PlotView } from '../../../plots/plot.tsx';
import { PlotActions } from '../../../plots/plot-actions.tsx';
import { PlotWords } from '../../../plots/plot-words.tsx';
import { Segmented } from '../../../plots/segmented.tsx';
import { ViewChoice } from '../../../plots/view-choice.tsx';
import { viewsOf } from '../../../plots/views.ts';
import type { Preview } from '../preview/use-preview.ts';

const narrowQuery = '(max-width: 48rem)';
const useNarrow = () =>
  useSyncExternalStore(
    (listen) => {
      const query = matchMedia(narrowQuery);
      query.addEventListener('change', listen);
      return () => query.removeEventListener('change', listen);
    },
    () => matchMedia(narrowQuery).matches,
  );

/** The drawing of a reduced copy; the last good one stays, paler, while a newer one is computed or has a fault. */
export function PreviewPane({
  model,
  preview,
  incomplete,
  place,
}: {
  model: ModelDefinition;
  preview: Preview;
  /** The form has errors: what is drawn belongs to the last complete question. */
  incomplete: boolean;
  /** '12 T' where a sweep is previewed at one of its points. */
  place: string;
}) {
  const { result, busy, message } = preview;
  const views = useMemo(() => (result ? viewsOf(model.id, result.heads) : []), [result, model.id]);
  const [chosen, setChosen] = useState<string | null>(null);
  const view = views.find(({ id }) => id === chosen) ?? views[0];
  const [choice, setChoice] = useState(0);
  const built = useMemo<BuiltPlot | null>(
    () => (result && view ? view.build(result.data, choice) : null),
    [result, view, choice],
  );
  const narrow = useNarrow();
  const height = narrow ? 270 : 400;
  const left = result && result.stated.length > 0 ? result.stated.join(', ') : 'the whole question';
  const said = message ?? (incomplete ? 'The form is not complete; this is the last complete question.' : '');
  return (
    <section aria-label="Preview" aria-busy={busy} className="@max-4xl:contents">
      {views.length > 1 && view ? (
        <div className="mb-1 max-w-md">
          <Segmented
            label="What the preview draws"
            labelHidden
            options={views.map(({ id, label }) => ({ value: id, label }))}
            value={view.id}
            onChange={setChosen}
          />
        </div>
      ) : null}
      {built && view && result ? (
        <>
          {/* on a narrow page the drawing stays in view while one types; its words scroll away */}
          <div
            className={`@max-4xl:z-10 bg-ground @max-4xl:[@media(min-height:640px)]:sticky @max-4xl:top-0 ${incomplete ? 'text-ink3' : ''}`}
          >
            <ViewChoice view={view} data={result.data} choice={choice} onChoice={setChoice} />
            <PlotView key={view.id} built={built} height={height} words={false} />
          </div>
          <PlotWords
            plot={built.plot}
            remark={
              <>
                {place ? `At ${place}. ` : ''}Preview: {left}, {Math.max(1, Math.round(result?.ms ?? 0))} ms; no error
                estimate.
              </>
            }
            actions={<PlotActions built={built} name={`preview-${model.id}-${view.id}`} metadata={{ preview: left }} />}
          />
        </>
      ) : (
        <div className="grid min-h-[26rem] place-items-center border border-hair border-dashed p-6 text-center text-ink2">
          <p>{message ?? (busy ? 'The program is drawing …' : 'The preview appears here.')}</p>
        </div>
      )}
      <p role="status" className="min-h-5 text-small">
        {built && said ? said : ''}
      </p>
    </section>
  );
}
