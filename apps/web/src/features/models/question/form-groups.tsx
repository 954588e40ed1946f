import type { Display, Field } from '@nightcone/models';
import { FieldControl } from './field-control.tsx';
import type { Part } from './form-texts.ts';
import { useQuestionForm } from './question-context.ts';
import { nameOf } from './read-form.ts';

type Group = NonNullable<Display['group']>;
const groups: { id: Group; title: string }[] = [
  { id: 'material', title: 'Material' },
  { id: 'geometry', title: 'Geometry' },
  { id: 'fields', title: 'Fields' },
  { id: 'numerics', title: 'Numerics' },
  { id: 'request', title: 'Request' },
];

/** The form as its definition groups it; fields without a group stand with the numerics or the request. */
export function FormGroups() {
  const { model, checked } = useQuestionForm();
  const all = (['parameters', 'numerics'] as const).flatMap((part) =>
    model[part].map((field) => ({ part, field, group: groupOf(part, field) })),
  );
  return (
    <>
      {groups.map(({ id, title }) => {
        const fields = all.filter(({ group }) => group === id);
        if (fields.length === 0) return null;
        return (
          <section
            key={id}
            aria-labelledby={`group-${id}`}
            className="border-hair border-b py-2 last:border-b-0 sm:grid sm:grid-cols-[5.4rem_minmax(0,1fr)]"
          >
            <h2 id={`group-${id}`} className="pt-[3px] font-medium text-h3 italic">
              {title}
            </h2>
            <div className="min-w-0">
              {fields.map(({ part, field }) => (
                <FieldControl
                  key={nameOf(part, field)}
                  name={nameOf(part, field)}
                  field={field}
                  value={checked[part][field.name]}
                />
              ))}
            </div>
          </section>
        );
      })}
    </>
  );
}

const groupOf = (part: Part, field: Field): Group =>
  field.display?.group ?? (part === 'numerics' ? 'numerics' : 'request');
