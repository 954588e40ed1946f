import { useId } from 'react';

/** One of a few, as buttons side by side: radio buttons in behaviour, so arrow keys choose. */
export function Segmented<Value extends string>({
  label,
  options,
  value,
  onChange,
  labelHidden = false,
  describedBy,
}: {
  label: string;
  options: readonly { value: Value; label: string; help?: string }[];
  value: Value;
  onChange: (value: Value) => void;
  labelHidden?: boolean;
  describedBy?: string;
}) {
  const name = useId();
  return (
    <fieldset className="min-w-0" aria-describedby={describedBy}>
      <legend className={labelHidden ? 'sr-only' : 'mb-1 text-small'}>{label}</legend>
      <div className="flex flex-wrap border-rule border-b">
        {options.map((option) => (
          <label
            key={option.value}
            title={option.help}
            className="relative flex min-h-7 flex-auto cursor-pointer items-center justify-center bg-field px-2 py-0.5 text-center text-ink2 text-small leading-tight has-checked:bg-ink has-checked:font-semibold has-checked:text-ground has-focus-visible:outline-2 has-focus-visible:outline-ink has-focus-visible:outline-offset-2 max-margin:min-h-[34px]"
          >
            <input
              type="radio"
              name={name}
              value={option.value}
              checked={option.value === value}
              onChange={() => onChange(option.value)}
              className="absolute inset-0 cursor-pointer appearance-none outline-none"
            />
            <span className="relative">{option.label}</span>
          </label>
        ))}
      </div>
    </fieldset>
  );
}
