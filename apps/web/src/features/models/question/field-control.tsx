import type { ChoiceType, Field, Json } from '@nightcone/models';
import { useId } from 'react';
import { Button, TextButton } from '../../../components/button.tsx';
import { ChoiceControl, EnumControl } from './choice-controls.tsx';
import { ControlRow } from './control-row.tsx';
import { countName } from './form-texts.ts';
import { QuantityControl } from './quantity-control.tsx';
import { useQuestionForm } from './question-context.ts';

/** The control of any field, by its type. `value` is what its texts mean now. */
export function FieldControl({ name, field, value }: { name: string; field: Field; value: Json | undefined }) {
  switch (field.type) {
    case 'choice':
      return (
        <ChoiceControl
          name={name}
          field={field as Field & ChoiceType}
          value={value}
          renderMember={(inner, member, its) => <FieldControl key={inner} name={inner} field={member} value={its} />}
        />
      );
    case 'enum':
      return <EnumControl name={name} field={field} />;
    case 'group':
      return (
        <>
          {field.members.map((member) => (
            <FieldControl
              key={member.name}
              name={`${name}/${member.name}`}
              field={member}
              value={(value as { [key: string]: Json } | undefined)?.[member.name]}
            />
          ))}
        </>
      );
    case 'boolean':
      return <BooleanControl name={name} field={field} />;
    case 'list':
      return field.items.type === 'group' || field.items.type === 'choice' ? (
        <ListControl name={name} field={field} value={value} />
      ) : (
        <QuantityControl name={name} field={field} value={value} />
      );
    default:
      return <QuantityControl name={name} field={field} value={value} />;
  }
}

function BooleanControl({ name, field }: { name: string; field: Field }) {
  const { texts, setText } = useQuestionForm();
  const id = useId();
  return (
    <ControlRow name={name} field={field} htmlFor={id}>
      <input
        id={id}
        type="checkbox"
        checked={texts[name] === 'true'}
        onChange={(event) => setText(name, String(event.target.checked))}
        className="size-6 accent-ink"
      />
    </ControlRow>
  );
}

/** Items with members of their own, added and removed one by one. */
function ListControl({
  name,
  field,
  value,
}: {
  name: string;
  field: Field & { type: 'list' };
  value: Json | undefined;
}) {
  const { texts, setText, problems } = useQuestionForm();
  const count = Number(texts[countName(name)] ?? 0);
  const items = Array.isArray(value) ? value : [];
  const error = problems.get(name);
  const itemField = { ...field.items, name: field.name } as Field;
  return (
    <>
      <ControlRow name={name} field={field} {...(error ? { error } : {})}>
        <Button onClick={() => setText(countName(name), String(count + 1))} disabled={count >= field.maxItems}>
          Add one
        </Button>
      </ControlRow>
      {items.map((item, i) => (
        // biome-ignore lint/suspicious/noArrayIndexKey: an item of a list has no other name than its place
        <fieldset key={i} className="border-rule border-l pl-2">
          <legend className="text-ink2 text-small">
            {field.display?.title ?? field.name} {i + 1}
          </legend>
          <FieldControl name={`${name}/${i}`} field={itemField} value={item} />
          {i === count - 1 && count > field.minItems ? (
            <TextButton onClick={() => setText(countName(name), String(count - 1))}>Remove</TextButton>
          ) : null}
        </fieldset>
      ))}
    </>
  );
}
