import { models } from '@nightcone/models';
import { Link } from 'react-router-dom';
import { plural } from '../../lib/format-quantity.ts';

/** Worked examples for the first five minutes: one click fills New question. */
export default function FirstQuestions() {
  const examples = models.flatMap((model) => model.examples.map((example) => ({ model, example })));
  return (
    <section aria-labelledby="first-questions">
      <h2 id="first-questions">Start from a worked example</h2>
      <p className="mt-1 max-w-[70ch] text-ink2">
        Each fills New question with a published case; the preview draws it at once, one more click submits it.
      </p>
      <ul className="mt-3 grid gap-x-8 sm:grid-cols-2">
        {examples.map(({ model, example }) => (
          <li key={`${model.id} ${example.id}`} className="border-hair border-b py-2.5">
            <Link to={`/question/${model.id}?example=${example.id}`} className="group block">
              <span className="link font-semibold group-hover:border-ink">{example.title}</span>
              <span className="mt-0.5 block text-small">{example.question}</span>
              <span className="mt-0.5 block text-ink3 text-least">
                {model.title.toLowerCase()}, {plural(jobsOf(example.sweep), 'job')}. {example.source}
              </span>
            </Link>
          </li>
        ))}
      </ul>
    </section>
  );
}

const jobsOf = (sweep: readonly { values: readonly unknown[] }[] = []) =>
  sweep.reduce((product, axis) => product * axis.values.length, 1);
