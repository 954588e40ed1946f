import { jobStates } from '@nightcone/contracts';
import { useEffect, useState } from 'react';
import { SelectField, TextField } from '../../components/field.tsx';
import { stateWord } from '../../components/state-mark.tsx';
import { modelWords } from '../../lib/model-words.ts';
import { useApi } from '../../lib/query.ts';

export interface JobFilters {
  model?: string;
  state?: string;
  mine?: string;
  text?: string;
}
/** Typing settles before the server is asked. */
const settleMs = 300;

export function JobsFilters({
  filters,
  change,
}: {
  filters: JobFilters;
  change: (change: { [name in keyof JobFilters]?: string | undefined }) => void;
}) {
  const catalogue = useApi('listModels');
  const [text, setText] = useState(filters.text ?? '');
  // biome-ignore lint/correctness/useExhaustiveDependencies: only typing starts the timer
  useEffect(() => {
    if (text === (filters.text ?? '')) return;
    const timer = setTimeout(() => change({ text }), settleMs);
    return () => clearTimeout(timer);
  }, [text]);
  const ids = (catalogue.data?.models ?? []).map((model) => String((model as { id?: unknown } | null)?.id ?? ''));
  return (
    <search className="mb-4 grid grid-cols-2 gap-x-5 gap-y-3 md:grid-cols-[minmax(10rem,1.4fr)_1fr_1fr_1fr]">
      <TextField
        label="Words or hash"
        value={text}
        onChange={(event) => setText(event.target.value)}
        autoComplete="off"
        maxLength={100}
      />
      <SelectField
        label="Model"
        value={filters.model ?? ''}
        onChange={(event) => change({ model: event.target.value })}
      >
        <option value="">all models</option>
        {ids.map((id) => (
          <option key={id} value={id}>
            {modelWords(id)}
          </option>
        ))}
      </SelectField>
      <SelectField
        label="State"
        value={filters.state ?? ''}
        onChange={(event) => change({ state: event.target.value })}
      >
        <option value="">all states</option>
        {jobStates.map((state) => (
          <option key={state} value={state}>
            {stateWord(state)}
          </option>
        ))}
      </SelectField>
      <SelectField
        label="Asked by"
        value={filters.mine ?? ''}
        onChange={(event) => change({ mine: event.target.value })}
      >
        <option value="">everybody</option>
        <option value="true">you</option>
        <option value="false">others</option>
      </SelectField>
    </search>
  );
}
