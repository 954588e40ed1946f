import type { ChoiceType, Field, Json } from '@nightcone/models';
import { type ReactNode, useId } from 'react';
import { inputLook } from '../../../components/field.tsx';
import { Segmented } from '../../../plots/segmented.tsx';
import { ControlRow } from './control-row.tsx';
import { kindName, memberName } from './form-texts.ts';
import { ProfilePlot } from './profile-plot.tsx';
import { useQuestionForm } from './question-context.ts';

type ChoiceField = Field & ChoiceType;
const enumWords: Record<string, string> = { 'K-prime': 'K′' };

/** A few short kinds stand side by side; many or long ones are a list. */
const fitsSideBySide = (labels: readonly string[]) => labels.length <= 4 && labels.join('').length <= 32;

/** `renderMember` draws the members of the chosen kind, which may be choices again. */
export function ChoiceControl({
  name,
  field,
  value,
  renderMember,
}: {
  name: string;
  field: ChoiceField;
  value: Json | undefined;
  renderMember: (name: string, member: Field, value: Json | undefined) => ReactNode;
}) {
  const { texts, setText, problems, showHelp } = useQuestionForm();
  const kind = texts[kindName(name)] ?? '';
  const chosen = field.kinds.find((each) => each.kind === kind);
  const isProfile = ['polynomial', 'steps', 'sine'].includes(kind);
  const options = field.kinds.map((each) => ({
    value: each.kind,
    label: each.display?.title ?? each.kind,
    ...(each.display ? { help: each.display.help } : {}),
  }));
  const error = problems.get(name);
  const inner = (member: Field) => memberName(name, kind, member.name);
  return (
    <>
      <OneOf
        name={name}
        field={field}
        options={options}
        value={kind}
        onChange={(next) => {
          setText(kindName(name), next);
          const help = field.kinds.find((each) => each.kind === next)?.display;
          showHelp(help ?? null);
        }}
        {...(error ? { error } : {})}
      />
      {chosen?.members.map((member) =>
        renderMember(inner(member), member, (value as { [key: string]: Json } | undefined)?.[member.name]),
      )}
      {isProfile && value ? (
        <ProfilePlot
          value={value}
          unit={profileUnit(field)}
          title={field.display?.title ?? name}
          symbol={field.display?.symbol ?? ''}
        />
      ) : null}
    </>
  );
}

function profileUnit(field: ChoiceField): string {
  const amplitude = field.kinds.find(({ kind }) => kind === 'sine')?.members.find(({ name }) => name === 'amplitude');
  return amplitude && 'unit' in amplitude ? amplitude.unit : '';
}

export function EnumControl({ name, field }: { name: string; field: Field & { type: 'enum'; values: string[] } }) {
  const { texts, setText, problems } = useQuestionForm();
  const error = problems.get(name);
  return (
    <OneOf
      name={name}
      field={field}
      options={field.values.map((value) => ({ value, label: enumWords[value] ?? value }))}
      value={texts[name] ?? ''}
      onChange={(next) => setText(name, next)}
      {...(error ? { error } : {})}
    />
  );
}

function OneOf({
  name,
  field,
  options,
  value,
  onChange,
  error,
}: {
  name: string;
  field: Field;
  options: readonly { value: string; label: string; help?: string }[];
  value: string;
  onChange: (value: string) => void;
  error?: string;
}) {
  const id = useId();
  const sideBySide = fitsSideBySide(options.map(({ label }) => label));
  return (
    <ControlRow
      name={name}
      field={field}
      {...(sideBySide ? { labelId: id } : { htmlFor: id })}
      {...(error ? { error } : {})}
    >
      {sideBySide ? (
        <Segmented
          label={field.display?.title ?? field.name}
          labelHidden
          options={options}
          value={value}
          onChange={onChange}
        />
      ) : (
        <select
          id={id}
          value={value}
          onChange={(event) => onChange(event.target.value)}
          className={`${inputLook} font-sans text-small`}
        >
          {options.map((option) => (
            <option key={option.value} value={option.value}>
              {option.label}
            </option>
          ))}
        </select>
      )}
    </ControlRow>
  );
}
