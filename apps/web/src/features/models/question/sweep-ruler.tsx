import { useId } from 'react';
import { formatNumber } from '../../../lib/format-quantity.ts';
import { pointerOfName, togetherName } from './form-texts.ts';
import { useQuestionForm } from './question-context.ts';
import type { SweptControl } from './read-form.ts';

/** Ticks of a sweep's values with a mark under the one that is previewed; a slider moves it. */
export function SweepRuler({ control }: { control: SweptControl }) {
  const { checked, positions, setPosition, texts, setText } = useQuestionForm();
  const id = useId();
  const axis = checked.axes.findIndex(({ pointers }) => pointers.includes(control.pointer));
  const { values } = control;
  const unit = 'unit' in control.field ? control.field.unit : '';
  const last = values.length - 1;
  const at = Math.min(positions[axis] ?? 0, last);
  const text = (value: number | undefined) =>
    value === undefined ? '' : `${formatNumber(value)}${unit ? ` ${unit}` : ''}`;
  const partners = checked.swept.filter(({ name }) => name !== control.name);
  const step = control.range && last > 0 ? ((values[last] as number) - (values[0] as number)) / last : null;
  const ticks = last <= 60 ? values.map((_, i) => i / last) : Array.from({ length: 61 }, (_, i) => i / 60);
  return (
    <div className="pt-2 pb-1">
      <div className="relative h-6">
        <svg aria-hidden="true" className="absolute inset-0 h-6 w-full overflow-visible text-ink">
          <path d="M0,0" />
          <line x1="0" x2="100%" y1="7" y2="7" className="stroke-ink" />
          {ticks.map((part, i) => (
            <line
              key={part}
              x1={`${100 * part}%`}
              x2={`${100 * part}%`}
              y1={i === 0 || i === ticks.length - 1 ? 2 : 4}
              y2={i === 0 || i === ticks.length - 1 ? 12 : 10}
              className="stroke-ink"
            />
          ))}
          <svg x={`${(100 * at) / Math.max(1, last)}%`} y="14" overflow="visible" aria-hidden="true">
            <path d="M0,0L5,8H-5Z" className="fill-ink" />
          </svg>
        </svg>
        <input
          id={id}
          type="range"
          min={0}
          max={last}
          value={at}
          aria-label={`Value of ${control.field.display?.title ?? control.pointer} that is previewed`}
          aria-valuetext={text(values[at])}
          onChange={(event) => setPosition(axis, Number(event.target.value))}
          className="absolute inset-0 h-6 w-full cursor-pointer opacity-0 focus-visible:opacity-100 [&:not(:focus-visible)]:appearance-none"
        />
      </div>
      <p className="flex justify-between gap-3 text-ink2 text-least">
        <span className="num whitespace-nowrap">{text(values[0])}</span>
        <span className="text-center">
          {values.length} values{step ? `, step ${text(Number(step.toPrecision(6)))}` : ''}; previewing{' '}
          {text(values[at])}
        </span>
        <span className="num whitespace-nowrap">{text(values[last])}</span>
      </p>
      {partners.length > 0 ? (
        <label className="flex items-center gap-2 text-ink2 text-least">
          varies
          <select
            className="bg-field px-1 py-0.5"
            value={texts[togetherName(control.name)] ?? ''}
            onChange={(event) => setText(togetherName(control.name), event.target.value)}
          >
            <option value="">on its own</option>
            {partners.map((partner) => (
              <option
                key={partner.name}
                value={partner.name}
                disabled={partner.values.length !== values.length || texts[togetherName(partner.name)] === control.name}
              >
                together with {partner.field.display?.title ?? pointerOfName(partner.name)}
              </option>
            ))}
          </select>
        </label>
      ) : null}
    </div>
  );
}
