import { TextButton } from '../../../components/button.tsx';
import { otherAxesName } from './form-texts.ts';
import { useQuestionForm } from './question-context.ts';
import { otherAxes } from './read-form.ts';

/** Axes of the sweep that vary whole choices or axes: they came with an example or a paste and are shown as they are. */
export function OtherAxes() {
  const { texts, setText } = useQuestionForm();
  const axes = otherAxes(texts);
  if (axes.length === 0) return null;
  return (
    <section aria-labelledby="other-axes" className="border-hair border-b py-2">
      <h2 id="other-axes" className="font-medium text-h3 italic">
        Also varies
      </h2>
      <ul className="text-small">
        {axes.map((axis) => (
          <li key={axis.pointers.join(' ')} className="flex items-baseline justify-between gap-4 py-1">
            <span className="min-w-0">
              <code>{axis.pointers.join(', ')}</code>, {axis.values?.length ?? axis.range?.count ?? 0} values
            </span>
            <TextButton onClick={() => setText(otherAxesName, JSON.stringify(axes.filter((each) => each !== axis)))}>
              Remove
            </TextButton>
          </li>
        ))}
      </ul>
    </section>
  );
}
