import { SelectField } from '../components/field.tsx';
import type { ResultData } from './result-data.ts';
import type { View } from './view.ts';

/** What a view lets one choose, where there is more than one thing to choose from. */
export function ViewChoice({
  view,
  data,
  choice,
  onChoice,
}: {
  view: View;
  data: ResultData;
  choice: number;
  onChoice: (choice: number) => void;
}) {
  const list = view.choices?.list(data) ?? [];
  if (!view.choices || list.length < 2) return null;
  return (
    <div className="mb-2 max-w-72">
      <SelectField label={view.choices.label} value={choice} onChange={(event) => onChoice(Number(event.target.value))}>
        {list.map((text, place) => (
          <option key={text} value={place}>
            {text}
          </option>
        ))}
      </SelectField>
    </div>
  );
}
