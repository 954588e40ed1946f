import { type Field, isRangeText, type Json } from '@nightcone/models';
import { type KeyboardEvent, useId } from 'react';
import { TextButton } from '../../../components/button.tsx';
import { inputLook } from '../../../components/field.tsx';
import { ControlRow } from './control-row.tsx';
import { derivedLine } from './derived-line.ts';
import { pointerOfName } from './form-texts.ts';
import { useQuestionForm } from './question-context.ts';
import { stepText, suggestRange } from './step-text.ts';
import { SweepRuler } from './sweep-ruler.tsx';

/** A number, an axis, an 'auto' number or a list as text, with its unit; numbers may be swept. */
export function QuantityControl({ name, field, value }: { name: string; field: Field; value: Json | undefined }) {
  const { register, setText, texts, checked, problems, showHelp } = useQuestionForm();
  const id = useId();
  const text = texts[name] ?? '';
  const error = problems.get(name);
  const swept = checked.swept.find((control) => control.name === name);
  const sweepable = field.type === 'number' || field.type === 'integer';
  const looksSwept = sweepable && (isRangeText(text) || swept !== undefined);
  const unit = 'unit' in field ? field.unit : field.type === 'list' && 'unit' in field.items ? field.items.unit : '';
  const derived = swept || error ? null : derivedLine(pointerOfName(name), value, checked);
  const onKeyDown = (event: KeyboardEvent<HTMLInputElement>) => {
    if (event.key !== 'ArrowUp' && event.key !== 'ArrowDown') return;
    const next = stepText(
      event.currentTarget.value,
      event.key === 'ArrowUp' ? 1 : -1,
      event.shiftKey,
      field.type === 'integer',
    );
    if (next === null) return;
    event.preventDefault();
    setText(name, next);
  };
  const toggleSweep = () => {
    const single = swept ? String(value ?? swept.values[0] ?? '') : String(field.default ?? '');
    setText(name, looksSwept ? single : suggestRange(text, field));
  };
  // a unit of one's own, or a long text, takes the place of the unit
  const showUnit =
    unit !== '' && !/[a-zµ°Å]{1,}\s*(\/|$)/i.test(text.replace(/[\d.]e[+-]?\d/gi, '0')) && text.length < 18;
  const described = [error ? `${id}-error` : '', derived ? `${id}-derived` : ''].filter(Boolean).join(' ');
  return (
    <ControlRow inline name={name} field={field} htmlFor={id} errorId={`${id}-error`} {...(error ? { error } : {})}>
      <div className="flex items-center gap-2.5">
        <div className="relative min-w-0 flex-auto">
          <input
            {...register(name)}
            id={id}
            type="text"
            placeholder={field.type === 'list' ? 'none' : undefined}
            autoComplete="off"
            spellCheck={false}
            aria-invalid={error ? true : undefined}
            aria-describedby={described || undefined}
            className={`num ${inputLook}`}
            style={showUnit ? { paddingRight: `${unit.length * 0.62 + 1.1}em` } : undefined}
            onKeyDown={onKeyDown}
            onFocus={() => showHelp(field.display ? { title: field.display.title, help: helpOf(field) } : null)}
          />
          {showUnit ? (
            <span
              aria-hidden="true"
              className="num pointer-events-none absolute inset-y-0 right-2 flex items-center text-ink3"
            >
              {unit}
            </span>
          ) : null}
        </div>
        {sweepable ? (
          <TextButton
            onClick={toggleSweep}
            aria-pressed={looksSwept}
            aria-label={`${looksSwept ? 'Stop sweeping' : 'Sweep'} ${field.display?.title ?? field.name}`}
            className={`w-17 shrink-0 justify-start border-b-transparent text-small ${looksSwept ? 'font-semibold' : 'text-ink2'}`}
          >
            <span className={looksSwept ? '' : 'border-rule border-b'}>{looksSwept ? 'sweeping' : 'sweep'}</span>
          </TextButton>
        ) : null}
      </div>
      {derived ? (
        <p id={`${id}-derived`} className="num pt-0.5 text-ink3 text-least">
          {derived}
        </p>
      ) : null}
      {swept && swept.values.length > 1 ? <SweepRuler control={swept} /> : null}
    </ControlRow>
  );
}

function helpOf(field: Field): string {
  const help = field.display?.help ?? '';
  if (field.type === 'number' || field.type === 'integer')
    return `${help} ${field.min} to ${field.max}${'unit' in field && field.unit ? ` ${field.unit}` : ''}.`;
  if (field.type === 'axis')
    return `${help} One number, a range such as −1..1 / 201, or values separated by commas; ${field.min} to ${field.max} ${field.unit}.`;
  return help;
}
