import { models } from '@nightcone/models';
import { Link } from 'react-router-dom';
import { Page } from '../../../components/page.tsx';
import { SheetRow } from '../../../components/sheet.tsx';
import { plural } from '../../../lib/format-quantity.ts';
import { readDraft } from './use-draft.ts';

/** Picks a model by the question it answers. */
export function Component() {
  return (
    <Page title="New question" lead="Which question shall the night answer?">
      {models.map((model) => (
        <SheetRow key={model.id} divided={model !== models[0]}>
          <section aria-labelledby={`model-${model.id}`}>
            <h2 id={`model-${model.id}`} className="text-[1.4rem] leading-8">
              <Link
                to={`/question/${model.id}`}
                className="font-medium underline decoration-1 decoration-rule underline-offset-4 hover:decoration-ink"
              >
                {model.question}
              </Link>
            </h2>
            <p className="mt-1 text-ink2">
              {model.title}. {model.summary}{' '}
              <Link to={`/methods/${model.id}`} className="link">
                How it is computed
              </Link>
            </p>
            {readDraft(model.id) ? <p className="mt-1 text-small">A draft of yours waits there.</p> : null}
            {model.examples.length > 0 ? (
              <ul className="mt-3 grid gap-x-8 sm:grid-cols-2">
                {model.examples.map((example) => (
                  <li key={example.id} className="border-hair border-t py-2.5">
                    <Link to={`/question/${model.id}?example=${example.id}`} className="group block">
                      <span className="link font-semibold group-hover:border-ink">{example.title}</span>
                      <span className="mt-0.5 block text-small">{example.question}</span>
                      <span className="mt-0.5 block text-ink3 text-least">
                        {plural(
                          (example.sweep ?? []).reduce((product, axis) => product * axis.values.length, 1),
                          'job',
                        )}
                        . {example.source}
                      </span>
                    </Link>
                  </li>
                ))}
              </ul>
            ) : null}
          </section>
        </SheetRow>
      ))}
    </Page>
  );
}
